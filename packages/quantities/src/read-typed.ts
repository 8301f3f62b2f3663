import { minorDigits, minorUnits, type MinorUnits } from './money.js';
import { readDecimal, type Reading } from './read-number.js';
import { milliCarats, type MilliCarats, type Step } from './weight.js';

const MOST_CARATS = milliCarats(100_000_000_000);
const MOST_PIECES = 1_000_000_000;

/** Reads carats (`4.00`, `4,5 ct`, `12 pt`) as a positive multiple of the house's step. */
export function readCarats(text: string, step: Step, what = 'Weight'): Reading<MilliCarats> {
  const points = /^(.*?)\s*(pt|pts|points?)$/i.exec(text.trim());
  const bare = points?.[1] ?? text.trim().replace(/\s*(ct|cts|carats?)$/i, '');
  const reading = readDecimal(bare, points ? 1 : 3, what);
  if (reading.kind === 'bad') return reading;
  const values = reading.kind === 'ok' ? [reading.value] : reading.readings;
  const fitting = values.filter((value) => value > 0 && value % step === 0 && value <= MOST_CARATS);
  if (reading.kind === 'ambiguous' && fitting.length > 1) {
    return { ...reading, readings: fitting.map(milliCarats) };
  }
  const [value] = fitting;
  if (value !== undefined) return { kind: 'ok', value: milliCarats(value) };
  if (values.some((one) => one > MOST_CARATS)) return { kind: 'bad', why: `${what} is more than a house can hold.` };
  if (values.every((one) => one === 0)) return { kind: 'bad', why: `${what} is zero; it needs carats.` };
  return { kind: 'bad', why: `${what} has three decimals; this house's balance reads to 0.01 ct.` };
}

/** Reads a count of stones (`13`, `13p`, `13 pcs`), at least one. */
export function readPieces(text: string, what = 'Pieces'): Reading<number> {
  const reading = readDecimal(text.trim().replace(/\s*(p|pc|pcs|pieces?|stones?)$/i, ''), 0, what);
  if (reading.kind !== 'ok') return reading;
  if (reading.value < 1) return { kind: 'bad', why: `${what} is zero; at least one stone is needed.` };
  if (reading.value > MOST_PIECES) return { kind: 'bad', why: `${what} is more than a parcel can hold.` };
  return reading;
}

/** Reads money of one currency (`5,280`, `5280.00 USD`), zero allowed. */
export function readMoney(text: string, currency: string, what = 'Amount'): Reading<MinorUnits> {
  const named = /^(.*?)\s*([A-Za-z]{3})(?:\/ct)?$/.exec(text.trim());
  if (named?.[2] && named[2].toUpperCase() !== currency) {
    return { kind: 'bad', why: `${what} is in ${named[2].toUpperCase()}; this paper is in ${currency}.` };
  }
  // In money a comma before exactly three digits is a thousands mark; no currency here writes cents so.
  const bare = (named?.[1] ?? text).trim();
  const grouped = minorDigits(currency) < 3 ? bare.replace(/^(\d{1,3}),(\d{3})$/, '$1$2') : bare;
  const reading = readDecimal(grouped, minorDigits(currency), what);
  return reading.kind === 'ok' ? { kind: 'ok', value: minorUnits(reading.value) } : (reading as Reading<MinorUnits>);
}

/** Reads millimetres (`6.42`) into thousandths. */
export function readMillimetres(text: string, what = 'Measurement'): Reading<number> {
  const reading = readDecimal(text.trim().replace(/\s*mm$/i, ''), 3, what);
  if (reading.kind === 'ok' && (reading.value < 100 || reading.value > 200_000)) {
    return { kind: 'bad', why: `${what} must lie between 0.1 and 200 mm.` };
  }
  return reading;
}
