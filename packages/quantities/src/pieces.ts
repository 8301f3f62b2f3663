import { type Brand, exactInteger } from './exact-integer.js';
import { grouped } from './grouped.js';
import { halfAwayFromZero } from './money/half-away-from-zero.js';

/** A whole number of stones. */
export type Pieces = Brand<number, 'Pieces'>;

/** Marks a whole number as pieces; throws a RangeError on anything else. */
export function pieces(value: number): Pieces {
  return exactInteger(value, 'pieces') as Pieces;
}

/** `184 pcs`, or `about 598 pcs` where they are estimated from weight. */
export function formatPieces(count: number, isEstimated = false): string {
  return `${isEstimated ? 'about ' : ''}${count < 0 ? '−' : ''}${grouped(String(Math.abs(count)))} pcs`;
}

/**
 * Pieces of an estimated parcel that go with a part of its weight: their share, half away from zero;
 * the last weight takes all of them, and what weighs nothing goes whole.
 */
export function piecesFollowing(part: number, whole: { weight: number; pieces: number }): Pieces {
  if (whole.weight === 0) return pieces(whole.pieces);
  const share = halfAwayFromZero(BigInt(whole.pieces) * BigInt(part), BigInt(whole.weight));
  return pieces(Number(share));
}
