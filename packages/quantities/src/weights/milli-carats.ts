import { type Brand, exactInteger } from '../exact-integer.js';

/**
 * Weight in whole thousandths of a carat, the finest step a carat balance shows. Whole numbers keep
 * sums exact, and 0.29 ct is 29 points, never 28.
 */
export type MilliCarats = Brand<number, 'MilliCarats'>;

/** The house's step: every ledger weight is a multiple of it, 10 for 0.01 ct or 1 for 0.001 ct. */
export type Step = 1 | 10;

/** 1 ct = 200 mg and 1 point = 1/100 ct = 2 mg (16 CFR 23.18, note to (b)). */
export const MILLIGRAMS_PER_CARAT = 200;
export const POINTS_PER_CARAT = 100;
/** Four gem grains to the carat (G. F. Herbert Smith, Gem-Stones, London 1912, ch. XI). */
export const GRAINS_PER_CARAT = 4;

/** Marks a whole number of thousandths as a weight; throws a RangeError on anything else. */
export function milliCarats(value: number): MilliCarats {
  return exactInteger(value, 'weight in thousandths of a carat') as MilliCarats;
}

/** Adds weights; throws a RangeError where the sum can no longer be exact. */
export function sumWeights(weights: readonly MilliCarats[]): MilliCarats {
  return milliCarats(weights.reduce<number>((sum, weight) => sum + weight, 0));
}

/** Milligrams of a weight as text, `10650` or `0.2`: a thousandth of a carat is two tenths of one. */
export function milligrams(weight: MilliCarats): string {
  const tenths = String(Math.abs(weight) * 2).padStart(2, '0');
  const text = `${tenths.slice(0, -1)}.${tenths.slice(-1)}`.replace(/\.0$/, '');
  return weight < 0 ? `−${text}` : text;
}
