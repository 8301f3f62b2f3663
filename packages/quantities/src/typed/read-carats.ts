import { type MilliCarats, milliCarats, type Step } from '../weights/milli-carats.js';
import { readDecimal } from './read-decimal.js';
import { bad, type Reading, typedText } from './reading.js';

/** A hundred million carats: more than any house holds, and small enough to multiply by prices. */
const MOST = 100_000_000_000;

/** Reads carats (`4.00`, `4,5 ct`, `12 pt`) as a weight that is a multiple of the house's step. */
export function readCarats(text: string, step: Step, what = 'Weight'): Reading<MilliCarats> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const points = /^(.*\d)\s*(pt|pts|points?)\.?$/i.exec(typed.value);
  const carats = /^(.*\d)\s*(ct|cts|carats?)\.?$/i.exec(typed.value);
  const bare = points?.[1] ?? carats?.[1] ?? typed.value;
  const reading = readDecimal(bare, { decimals: points ? 1 : 3, what, isSigned: true });
  if (reading.kind === 'bad') return reading;
  const values = reading.kind === 'ok' ? [reading.value] : reading.readings;
  const fitting = values.filter((value) => value > 0 && value % step === 0 && value <= MOST);
  const [value] = fitting;
  if (value === undefined) return bad(whyNone(values, what));
  if (reading.kind === 'ambiguous' && fitting.length > 1) {
    return { ...reading, readings: fitting.map(milliCarats) };
  }
  return { kind: 'ok', value: milliCarats(value) };
}

function whyNone(values: readonly number[], what: string): string {
  if (values.every((value) => value === 0)) return `${what} is zero; it needs carats.`;
  if (values.some((value) => value < 0)) return `${what} is less than nothing; it needs carats.`;
  if (values.some((value) => value > MOST)) return `${what} is more than a house can hold.`;
  return `${what} has three decimals; this house’s balance reads to 0.01 ct.`;
}
