import fc from 'fast-check';
import { expect, test } from 'vitest';

import { formatAmount, formatMoney, formatPercent } from '../money/format-money.js';
import { formatPieces } from '../pieces.js';
import { formatCarats } from '../weights/format-weight.js';
import { readCarats } from './read-carats.js';
import { readDecimal } from './read-decimal.js';
import { readMoney } from './read-money.js';
import { readPercent } from './read-percent.js';
import { readPieces } from './read-pieces.js';
import { valuesOf } from './reading.js';

/** Whole tens, hundreds and thousands come often: there marks and decimals are easily mistaken. */
const whole = (min: number, max: number) =>
  fc
    .tuple(fc.integer({ min, max }), fc.constantFrom(1, 10, 100, 1000, 10_000, 100_000, 1_000_000))
    .map(([value, step]) => Math.max(min, Math.trunc(value / step) * step || 0));
const weights = whole(1, 100_000_000_000);
const amounts = fc.oneof(whole(0, 900_000_000_000_000), whole(0, 9_999_999));

test('every weight we show can be typed back', () => {
  fc.assert(
    fc.property(weights, (weight) => {
      expect(readCarats(`${formatCarats(weight)} ct`, 1)).toEqual({ kind: 'ok', value: weight });
    }),
  );
});

test('every sum we show can be typed back, with and without decimals', () => {
  fc.assert(
    fc.property(amounts, fc.constantFrom('USD', 'JPY', 'KWD'), (amount, currency) => {
      const read = { kind: 'ok', value: amount };
      expect(readMoney(formatMoney(amount, currency), currency)).toEqual(read);
      if (currency !== 'KWD' || amount % 1000 !== 0 || amount < 1_000_000) {
        expect(readMoney(formatAmount(amount, currency, true), currency)).toEqual(read);
      }
    }),
  );
});

test('every count and percentage we show can be typed back', () => {
  fc.assert(
    fc.property(fc.oneof(whole(1, 1_000_000_000), whole(1, 99_999)), (count) => {
      expect(readPieces(formatPieces(count))).toEqual({ kind: 'ok', value: count });
    }),
  );
  fc.assert(
    fc.property(whole(-9_999, 100_000), (percent) => {
      expect(readPercent(formatPercent(percent))).toEqual({ kind: 'ok', value: percent });
    }),
  );
});

test('whatever is typed, it is read, asked about or refused in a sentence', () => {
  const keys = fc.string({ unit: fc.constantFrom(...'0123456789.,-+ ctp%\u0000’'), maxLength: 60 });
  fc.assert(
    fc.property(fc.oneof(keys, fc.string({ unit: 'binary' })), (text) => {
      for (const reading of [readCarats(text, 10), readMoney(text, 'USD'), readPieces(text)]) {
        for (const value of valuesOf<number>(reading)) {
          expect(Number.isSafeInteger(value) && value >= 0).toBe(true);
        }
        if (reading.kind !== 'ok') expect(reading.why).toMatch(/^[A-Z][^\p{C}]*\.$/u);
        if (reading.kind === 'ambiguous') expect(reading.readings.length).toBeGreaterThan(1);
      }
    }),
  );
});

test('one number written four ways is one number', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1000, max: 999_999_999 }), fc.nat(99), (whole, cents) => {
      const rest = String(cents).padStart(2, '0');
      const written = (mark: string, point: string) =>
        String(whole).replace(/\B(?=(\d{3})+(?!\d))/g, mark) + point + rest;
      const texts = [written('', '.'), written(',', '.'), written('.', ','), written(' ', ',')];
      for (const text of texts) {
        expect(readDecimal(text, { decimals: 2, what: 'It' })).toEqual({
          kind: 'ok',
          value: whole * 100 + cents,
        });
      }
    }),
  );
});
