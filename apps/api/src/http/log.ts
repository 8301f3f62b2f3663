/** One JSON line for people who keep the machine running: no bodies, no secrets, no addresses of pages. */
export function log(entry: Record<string, unknown>): void {
  if (process.env.NODE_ENV === 'test') return;
  process.stdout.write(`${JSON.stringify({ at: new Date().toISOString(), ...entry })}\n`);
}
