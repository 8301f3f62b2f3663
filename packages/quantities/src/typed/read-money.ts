import { type MinorUnits, minorDigits, minorUnits } from '../money/minor-units.js';
import { readDecimal } from './read-decimal.js';
import { bad, mapReading, type Reading, typedText } from './reading.js';

/**
 * Reads money of one currency (`5,280`, `5280.00 USD`), zero allowed, into minor units. Another
 * currency's code is refused; throws a RangeError only where `currency` itself isn't held.
 */
export function readMoney(text: string, currency: string, what = 'Amount'): Reading<MinorUnits> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const named = /^(.*\d)\s*([A-Za-z]{3})$/.exec(typed.value);
  const code = named?.[2]?.toUpperCase() ?? currency;
  if (code !== currency) return bad(`${what} is in ${code}; ${currency} is needed here.`);
  const decimals = minorDigits(currency);
  const bare = named?.[1] ?? typed.value;
  // A comma before exactly three digits is a thousands mark where the currency has fewer decimals.
  const joined = decimals < 3 ? bare.replace(/^([1-9]\d{0,2}),(\d{3})$/, '$1$2') : bare;
  const reading = readDecimal(joined, { decimals, what, isSigned: true, pointMayGroup: true });
  if (reading.kind === 'bad') return reading;
  const values = reading.kind === 'ok' ? [reading.value] : reading.readings;
  if (values.some((value) => value < 0)) return bad(`${what} is less than nothing.`);
  // `1.234` of a currency with cents is neither surely a thousand nor surely a slip of the hand.
  if (reading.kind === 'ok' && decimals < 3 && /^[1-9]\d{0,2}\.\d{3}$/.test(bare)) {
    return bad(
      `${what} “${bare}” has three digits after its point. Write it without thousands marks.`,
    );
  }
  return mapReading(reading, minorUnits);
}

/** Reads a price per carat (`420`, `@420`, `6,450 USD/ct`) into minor units. */
export function readPrice(text: string, currency: string, what = 'Price'): Reading<MinorUnits> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const bare = typed.value.replace(/^@\s*/, '').replace(/\s*(?:\/|per)\s*(?:ct|carat)$/i, '');
  return readMoney(bare, currency, what);
}
