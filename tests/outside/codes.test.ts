import {
  CODE128_STARTS,
  code128Check,
  code128Pairs,
  code128Values,
  formatMoney,
  gs1CheckDigit,
  MINOR_DIGITS,
  readMoney,
} from '@foldwell/quantities';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';

/**
 * GS1 India, "How to calculate the Check Digit"; GS1 Hong Kong, "How is the check digit calculated?";
 * GS1 Sweden, "Så beräknas kontrollsiffran".
 */
test.each([
  ['890400021003', 7],
  ['629104150021', 3],
  ['730001100001', 7],
])('the GS1 check digit of %s is %i', (digits, check) => {
  expect(gs1CheckDigit(digits)).toBe(check);
});

describe('Code 128 check characters', () => {
  const [CODE_B_IN_C, CODE_C_IN_B] = [100, 99];

  /** "Prüfziffer Modulo 103", barmatrixcode.de. */
  test('Start B, Bar, Code C, 0123, Code B, 4Code: 62', () => {
    const values = [
      ...code128Values('Bar'),
      CODE_C_IN_B,
      ...code128Pairs('0123'),
      CODE_B_IN_C,
      ...code128Values('4Code'),
    ];
    expect(code128Check(CODE128_STARTS.B, values)).toBe(62);
  });

  /** Wikipedia, "Code 128", check digit calculation. */
  test('Start A, PJJ123C: 54', () => {
    expect(code128Check(CODE128_STARTS.A, code128Values('PJJ123C'))).toBe(54);
  });
});

describe('ISO 4217 minor units', () => {
  /** OPC Foundation, OPC 10000-3 v1.05, 8.61 CurrencyUnitType, examples from ISO 4217. */
  test.each([
    ['1234.56', 'USD', 123456],
    ['1235', 'JPY', 1235],
  ])('%s %s are %i minor units', (text, currency, amount) => {
    expect(readMoney(text, currency)).toEqual({ kind: 'ok', value: amount });
    expect(formatMoney(amount, currency).replaceAll(',', '')).toBe(`${text} ${currency}`);
  });

  /** Unicode CLDR, supplemental currency data (fractions), as this Node's ICU ships it. */
  test.each(Object.entries(MINOR_DIGITS))('%s has %i decimals in CLDR too', (currency, digits) => {
    const format = new Intl.NumberFormat('en', { style: 'currency', currency });
    expect(format.resolvedOptions().maximumFractionDigits).toBe(digits);
  });
});

/** RFC 4180, Y. Shafranovich, October 2005, section 2, with RFC errata 5714. */
describe('lists separated by commas, as we read and write them', () => {
  const read = (text: string) => Papa.parse<string[]>(text).data;

  test('rule 7: a quotation mark is doubled inside its field', () => {
    expect(read('"aaa","b""bb","ccc"')).toEqual([['aaa', 'b"bb', 'ccc']]);
  });

  test('rule 6, as corrected: a line break stays in its field', () => {
    expect(read('"aaa","b\r\nbb","ccc"\r\nzzz,yyy,xxx')).toEqual([
      ['aaa', 'b\r\nbb', 'ccc'],
      ['zzz', 'yyy', 'xxx'],
    ]);
  });
});
