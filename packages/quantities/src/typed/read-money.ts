import { type MinorUnits, minorDigits, minorUnits } from '../money/minor-units.js';
import { readDecimal } from './read-decimal.js';
import { bad, mapReading, type Reading, typedText, valuesOf } from './reading.js';

/**
 * Reads money of one currency (`5,280`, `5280.00 USD`), zero allowed, into minor units. Another
 * currency's code is refused; throws a RangeError only where `currency` itself isn't held.
 */
export function readMoney(text: string, currency: string, what = 'Amount'): Reading<MinorUnits> {
  const decimals = minorDigits(currency);
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const [, bare = typed.value, code = currency] =
    /^(.*\d)\s*([A-Za-z]{3})$/.exec(typed.value) ?? [];
  if (code.toUpperCase() !== currency) {
    return bad(`${what} is in ${code.toUpperCase()}; ${currency} is needed here.`);
  }
  const reading =
    decimals < 3 ? readGrouped(bare, currency, what) : readPlain(bare, currency, what);
  return valuesOf(reading).some((value) => value < 0)
    ? bad(`${what} is less than nothing.`)
    : mapReading(reading, minorUnits);
}

function readPlain(
  bare: string,
  currency: string,
  what: string,
  pointMayGroup = false,
): Reading<number> {
  const decimals = minorDigits(currency);
  return readDecimal(bare, { decimals, what, unit: currency, isSigned: true, pointMayGroup });
}

/** Where a currency has fewer than three decimals, three digits after a point are asked about. */
function readGrouped(bare: string, currency: string, what: string): Reading<number> {
  const reading = readPlain(bare, currency, what, true);
  // They are neither surely a thousand nor surely a slip of the hand.
  if (reading.kind !== 'ok' || !/^[1-9]\d{0,2}\.\d{3}$/.test(bare)) return reading;
  return bad(
    `${what} “${bare}” has three digits after its point. Write it without thousands marks.`,
  );
}

/** Reads a price per carat (`420`, `@420`, `6,450 USD/ct`) into minor units. */
export function readPrice(text: string, currency: string, what = 'Price'): Reading<MinorUnits> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const bare = typed.value.replace(/^@\s*/, '').replace(/\s*(?:\/|per)\s*(?:ct|carat)$/i, '');
  return readMoney(bare, currency, what);
}
