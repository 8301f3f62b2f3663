import { type HundredthsPercent, hundredthsPercent } from '../money/prices.js';
import { readDecimal } from './read-decimal.js';
import { bad, mapReading, type Reading, typedText } from './reading.js';

/** Reads a signed percentage (`-32.5`, `+4 %`, `32,5 back`, `4 over`, `flat`) into hundredths of a percent. */
export function readPercent(text: string, what = 'Percentage'): Reading<HundredthsPercent> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  if (/^(flat|even)$/i.test(typed.value)) return { kind: 'ok', value: hundredthsPercent(0) };
  const [, bare = '', word = ''] = /^(.*?)\s*%?\s*(back|under|over)?$/i.exec(typed.value) ?? [];
  const reading = readDecimal(bare, { decimals: 2, what, unit: '%', isSigned: word === '' });
  const isUnder = /back|under/i.test(word);
  const signed = mapReading(reading, (value) => (isUnder ? -value || 0 : value));
  return signed.kind === 'ok'
    ? withinReason(signed.value, what)
    : mapReading(signed, hundredthsPercent);
}

function withinReason(value: number, what: string): Reading<HundredthsPercent> {
  if (value <= -10_000) {
    return bad(`${what} takes the whole price away; more than −100 % is needed.`);
  }
  if (value > 100_000) return bad(`${what} is over 1,000 %.`);
  return { kind: 'ok', value: hundredthsPercent(value) };
}
