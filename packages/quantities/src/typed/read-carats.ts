import { type MilliCarats, milliCarats, type Step } from '../weights/milli-carats.js';
import { type DecimalRules, readDecimal } from './read-decimal.js';
import { bad, mapReading, type Reading, typedText, valuesOf } from './reading.js';

/** A hundred million carats: more than any house holds, and small enough to multiply by prices. */
const MOST = 100_000_000_000;

/** Reads carats (`4.00`, `4,5 ct`, `12 pt`) as a weight that is a multiple of the house's step. */
export function readCarats(text: string, step: Step, what = 'Weight'): Reading<MilliCarats> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const reading = readDecimal(...withoutUnit(typed.value, what));
  if (reading.kind === 'bad') return reading;
  // Also where only one of two fits the step: `1,234` at step 0.01 is hardly a thousand carats.
  if (reading.kind === 'ambiguous' && reading.readings.every((value) => value > 0)) {
    return mapReading(reading, milliCarats);
  }
  const [value = 0] = valuesOf(reading);
  const why = whyNot(value, step, what);
  return why === null ? { kind: 'ok', value: milliCarats(value) } : bad(why);
}

/** The number alone, and how to read it: points have one decimal where carats have three. */
function withoutUnit(typed: string, what: string): [string, DecimalRules] {
  const [, number = typed, unit = 'ct'] =
    /^(.*\d)\s*(ct|cts|carats?|pt|pts|points?)\.?$/i.exec(typed) ?? [];
  const isPoints = /^p/i.test(unit);
  return [
    number,
    { decimals: isPoints ? 1 : 3, what, unit: isPoints ? 'pt' : 'ct', isSigned: true },
  ];
}

function whyNot(value: number, step: Step, what: string): string | null {
  if (value === 0) return `${what} is zero; it needs carats.`;
  if (value < 0) return `${what} is less than nothing; it needs carats.`;
  if (value > MOST) return `${what} is more than a house can hold.`;
  if (value % step === 0) return null;
  return `${what} has three decimals; this house’s balance reads to 0.01 ct.`;
}
