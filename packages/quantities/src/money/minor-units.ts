import { type Brand, exactInteger } from '../exact-integer.js';

/** Money in whole minor units of its currency (cents for USD, yen for JPY, fils for KWD). */
export type MinorUnits = Brand<number, 'MinorUnits'>;

/** Marks a whole number as minor units; throws a RangeError on anything else. */
export function minorUnits(value: number): MinorUnits {
  return exactInteger(value, 'money in minor units') as MinorUnits;
}

/**
 * Minor digits of ISO 4217 for the currencies a house can hold. USD, EUR, GBP, INR 2 and JPY 0 by
 * OPC 10000-3 v1.05, 8.61 (examples from ISO 4217); the others from memory.
 */
export const MINOR_DIGITS: Readonly<Record<string, 0 | 2 | 3>> = {
  USD: 2,
  EUR: 2,
  GBP: 2,
  CHF: 2,
  INR: 2,
  ILS: 2,
  AED: 2,
  HKD: 2,
  ZAR: 2,
  BWP: 2,
  CAD: 2,
  AUD: 2,
  SGD: 2,
  CNY: 2,
  JPY: 0,
  KRW: 0,
  KWD: 3,
  BHD: 3,
  OMR: 3,
  JOD: 3,
  TND: 3,
};

/** Minor digits of a currency; throws a RangeError on one the house can't hold. */
export function minorDigits(currency: string): 0 | 2 | 3 {
  const digits = Object.hasOwn(MINOR_DIGITS, currency) ? MINOR_DIGITS[currency] : undefined;
  if (digits === undefined) throw new RangeError(`unknown currency ${currency}`);
  return digits;
}
