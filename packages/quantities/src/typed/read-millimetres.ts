import { readDecimal } from './read-decimal.js';
import { bad, type Reading, typedText, valuesOf } from './reading.js';

/** Reads millimetres (`6.42`, `6,42 mm`) into thousandths of a millimetre. */
export function readMillimetres(text: string, what = 'Measurement'): Reading<number> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const reading = readDecimal(typed.value.replace(/\s*mm$/i, ''), {
    decimals: 3,
    what,
    unit: 'mm',
  });
  if (reading.kind === 'bad') return reading;
  const fitting = valuesOf(reading).filter((value) => value >= 100 && value <= 200_000);
  const [value] = fitting;
  if (value === undefined) return bad(`${what} must lie between 0.1 and 200 mm.`);
  return fitting.length === 1 ? { kind: 'ok', value } : reading;
}
