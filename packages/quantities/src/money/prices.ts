import { type Brand, exactInteger } from '../exact-integer.js';
import { halfAwayFromZero } from './half-away-from-zero.js';
import { type MinorUnits, minorUnits } from './minor-units.js';

/** A signed percentage in whole hundredths of a percent: −32.5 % is −3250. */
export type HundredthsPercent = Brand<number, 'HundredthsPercent'>;

/** Marks a whole number of hundredths as a percentage; throws a RangeError on anything else. */
export function hundredthsPercent(value: number): HundredthsPercent {
  return exactInteger(value, 'hundredths of a percent') as HundredthsPercent;
}

/** Price per carat (minor units) times weight (thousandths), once per line, half away from zero. */
export function lineAmount(pricePerCarat: number, weight: number): MinorUnits {
  return minorUnits(Number(halfAwayFromZero(BigInt(pricePerCarat) * BigInt(weight), 1000n)));
}

/** A sum agreed for a line, as a price per carat: what is shown, rounded; null without weight. */
export function pricePerCarat(amount: number, weight: number): MinorUnits | null {
  if (weight <= 0) return null;
  return minorUnits(Number(halfAwayFromZero(BigInt(amount) * 1000n, BigInt(weight))));
}

/** A price against the reference, `−32.5 %` as −3250; null without a reference. */
export function percentAgainst(price: number, reference: number): HundredthsPercent | null {
  if (reference <= 0) return null;
  const apart = BigInt(price) - BigInt(reference);
  return hundredthsPercent(Number(halfAwayFromZero(apart * 10_000n, BigInt(reference))));
}

/** The price so many hundredths of a percent over (or, negative, under) the reference. */
export function priceAtPercent(reference: number, percent: number): MinorUnits {
  const share = BigInt(reference) * (10_000n + BigInt(percent));
  return minorUnits(Number(halfAwayFromZero(share, 10_000n)));
}
