import { type Brand, exactInteger } from './exact-integer.js';

/** Weight in whole thousandths of a carat (1 ct = 200 mg = 100 points; 16 CFR 23.18, note to (b)). */
export type MilliCarats = Brand<number, 'MilliCarats'>;

/** The house's step: every ledger weight is a multiple of it, 10 for 0.01 ct or 1 for 0.001 ct. */
export type Step = 1 | 10;

/** Marks a whole number of thousandths as a weight. */
export function milliCarats(value: number): MilliCarats {
  return exactInteger(value, 'weight in thousandths of a carat') as MilliCarats;
}

/**
 * The weight a laboratory states for a single stone: hundredths go up only from nine thousandths,
 * 1.768 is 1.76 and 1.769 is 1.77 (Gemological Institute of America, FAQ on carat rounding).
 */
export function statedWeight(weight: MilliCarats): MilliCarats {
  const hundredths = Math.floor(weight / 10) + (weight % 10 === 9 ? 1 : 0);
  return milliCarats(hundredths * 10);
}

/** Whether a stone on our balance agrees with its report; at step 0.01 one hundredth away also does. */
export function agreesWithReport(found: MilliCarats, stated: MilliCarats, step: Step): boolean {
  const apart = Math.abs(statedWeight(found) - stated);
  return step === 10 ? apart <= 10 : apart === 0;
}

const group = (digits: string) => digits.replace(/\B(?=(\d{3})+(?!\d))/g, ',');

/** `48.62`, or three decimals where the third isn't zero; a true minus. No unit. */
export function formatCarats(weight: number, decimals?: 2 | 3): string {
  const size = Math.abs(weight);
  const places = decimals ?? (size % 10 === 0 ? 2 : 3);
  const whole = group(String(Math.floor(size / 1000)));
  const rest = String(size % 1000).padStart(3, '0').slice(0, places);
  return `${weight < 0 ? '−' : ''}${whole}.${rest}`;
}

/** A difference in points with its sign and unit: `−8 pt`, `+1 pt`, `0 pt`, tenths where needed. */
export function formatPoints(weight: number): string {
  const size = Math.abs(weight);
  const text = size % 10 === 0 ? String(size / 10) : `${Math.floor(size / 10)}.${size % 10}`;
  return `${weight < 0 ? '−' : weight > 0 ? '+' : ''}${text} pt`;
}

/** The average stone, `0.015`, in carats with three decimals; null without pieces. */
export function averageCarats(weight: number, pieces: number): string | null {
  if (pieces <= 0) return null;
  const average = Math.round(weight / pieces);
  return formatCarats(average, 3);
}
