/** Whether the long run was asked for: `npm run test:long`. */
export const isFull = process.env.FOLDWELL_FULL === '1';

/** The full count in the long run, a twentieth of it (at least one) in `npm test`. */
export function scale(full: number): number {
  return isFull ? full : Math.max(1, Math.round(full / 20));
}
