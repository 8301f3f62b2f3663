import { halfAwayFromZero } from '../money/half-away-from-zero.js';

/** n / d as text with so many decimals, half away from zero. */
function quotient(n: number, d: number, decimals: number): string {
  const units = halfAwayFromZero(BigInt(n) * 10n ** BigInt(decimals), BigInt(d));
  const digits = String(units).padStart(decimals + 1, '0');
  return `${digits.slice(0, -decimals)}.${digits.slice(-decimals)}`;
}

/**
 * The average stone in carats, `0.015` with three decimals or `0.0674` with four; null without
 * pieces. Weight in thousandths of a carat.
 */
export function averageCarats(weight: number, pieces: number, decimals: 3 | 4 = 3): string | null {
  return pieces > 0 && weight >= 0 ? quotient(weight, pieces * 1000, decimals) : null;
}

/** Stones to a carat with two decimals, `14.84`; null without weight. */
export function stonesPerCarat(weight: number, pieces: number): string | null {
  return weight > 0 && pieces >= 0 ? quotient(pieces * 1000, weight, 2) : null;
}
