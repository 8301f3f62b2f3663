import { type Pieces, pieces } from '../pieces.js';
import { readDecimal } from './read-decimal.js';
import { bad, mapReading, type Reading, typedText, valuesOf } from './reading.js';

const MOST = 1_000_000_000;

/** Reads a count of stones (`13`, `13p`, `13 pcs`, `1,151`), at least one. */
export function readPieces(text: string, what = 'Count'): Reading<Pieces> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const named = /^(.*\d)\s*(p|pc|pcs|pieces?|stones?)\.?$/i.exec(typed.value);
  const reading = readDecimal(named?.[1] ?? typed.value, {
    decimals: 0,
    what,
    unit: 'pcs',
    isSigned: true,
    pointMayGroup: true,
  });
  if (valuesOf(reading).some((value) => value < 0)) {
    return bad(`${what} is less than nothing; at least one stone is needed.`);
  }
  if (reading.kind !== 'ok') return mapReading(reading, pieces);
  if (reading.value < 1) return bad(`${what} is zero; at least one stone is needed.`);
  if (reading.value > MOST) return bad(`${what} is more than a parcel can hold.`);
  return mapReading(reading, pieces);
}
