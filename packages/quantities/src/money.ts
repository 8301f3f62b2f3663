import { type Brand, exactInteger } from './exact-integer.js';

/** Money in whole minor units of its currency (cents for USD, yen for JPY, fils for KWD). */
export type MinorUnits = Brand<number, 'MinorUnits'>;

/** Marks a whole number as minor units. */
export function minorUnits(value: number): MinorUnits {
  return exactInteger(value, 'money in minor units') as MinorUnits;
}

/**
 * Minor digits of ISO 4217. USD, EUR, GBP, INR 2 and JPY 0 by OPC 10000-3 v1.05, 8.61 (examples
 * from ISO 4217); the others from memory.
 */
export const MINOR_DIGITS: Readonly<Record<string, number>> = {
  USD: 2, EUR: 2, GBP: 2, CHF: 2, INR: 2, ILS: 2, AED: 2, HKD: 2, ZAR: 2, BWP: 2, CAD: 2, AUD: 2,
  SGD: 2, CNY: 2, JPY: 0, KRW: 0, KWD: 3, BHD: 3, OMR: 3, JOD: 3, TND: 3,
};

/** Minor digits of a currency; throws on one the house can't hold. */
export function minorDigits(currency: string): number {
  const digits = MINOR_DIGITS[currency];
  if (digits === undefined) throw new RangeError(`unknown currency ${currency}`);
  return digits;
}

/** n / d to a whole number, half away from zero; d > 0. */
export function halfAwayFromZero(n: bigint, d: bigint): bigint {
  const size = n < 0n ? -n : n;
  const rounded = (2n * size + d) / (2n * d);
  return n < 0n ? -rounded : rounded;
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

/**
 * Shares a whole by weights so that the parts add up to it: each gets its floor, the odd units go
 * to the largest remainders, ties to the first (method of largest remainder, Hamilton's).
 */
export function largestRemainder(total: number, weights: readonly number[]): number[] {
  const sum = weights.reduce((all, weight) => all + BigInt(weight), 0n);
  if (sum === 0n) return weights.map(() => 0);
  const size = BigInt(Math.abs(total));
  const parts = weights.map((weight, index) => {
    const product = size * BigInt(weight);
    return { index, share: product / sum, remainder: product % sum };
  });
  let odd = Number(size - parts.reduce((all, part) => all + part.share, 0n));
  const byRemainder = [...parts].sort((a, b) =>
    a.remainder === b.remainder ? a.index - b.index : a.remainder > b.remainder ? -1 : 1);
  for (const part of byRemainder) {
    if (odd === 0) break;
    part.share += 1n;
    odd -= 1;
  }
  return parts.map((part) => Number(part.share) * (total < 0 ? -1 : 1) || 0);
}

const group = (digits: string) => digits.replace(/\B(?=(\d{3})+(?!\d))/g, ',');

/** `3,878.42` without its currency; whole figures lose their zeros when `short`. */
export function formatAmount(amount: number, currency: string, short = false): string {
  const digits = minorDigits(currency);
  const size = String(Math.abs(amount)).padStart(digits + 1, '0');
  const whole = group(size.slice(0, size.length - digits));
  const rest = size.slice(size.length - digits);
  const decimals = digits === 0 || (short && /^0*$/.test(rest)) ? '' : `.${rest}`;
  return `${amount < 0 ? '−' : ''}${whole}${decimals}`;
}

/** `3,878.42 USD`: number before the code. */
export function formatMoney(amount: number, currency: string): string {
  return `${formatAmount(amount, currency)} ${currency}`;
}

/** `420 USD/ct`. */
export function formatPrice(amount: number, currency: string): string {
  return `${formatAmount(amount, currency, true)} ${currency}/ct`;
}
