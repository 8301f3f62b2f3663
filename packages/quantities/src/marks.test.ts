import { expect, test } from 'vitest';

import { code128Check, code128Pairs, code128Values } from './code128.js';
import { gs1CheckDigit } from './gs1.js';
import { formatMark, readMark } from './marks.js';

test.each([
  ['4127', 'lot', '4127'],
  ['04127', 'lot', '4127'],
  ['4127a', 'lot', '4127A'],
  ['M 20587', 'memo', '20587'],
  ['m20587', 'memo', '20587'],
  ['M 20587-1', 'memo', '20587'],
  ['c118', 'customer', '118'],
  ['W 30118', 'weighing', '30118'],
  ['V 8031', 'invoice', '8031'],
  ['R 5127', 'receipt', '5127'],
  ['K 0214', 'credit note', '214'],
  ['H 0264', 'hold', '264'],
  ['B 0318', 'order', '318'],
])('“%s” names a %s', (text, kind, number) => {
  expect(readMark(text)).toEqual({ kind, number });
});

test.each(['', 'M', 'Z 5', '0', 'M 0', 'AP-7718', 'V 8031-1', '4127 5', '1'.repeat(41)])(
  '“%s” names nothing of ours',
  (text) => {
    expect(readMark(text)).toBeNull();
  },
);

test('a mark is written with its letter, a lot bare', () => {
  expect(formatMark({ kind: 'memo', number: '20587' })).toBe('M 20587');
  expect(formatMark({ kind: 'lot', number: '4127A' })).toBe('4127A');
});

test('check values of our own labels', () => {
  expect(code128Check(104, code128Values('LOT-000123'))).toBe(93);
  expect(code128Check(104, code128Values('M-2026-00042'))).toBe(32);
});

test('what a code can’t hold is refused', () => {
  expect(() => code128Values('é')).toThrow(RangeError);
  expect(() => code128Pairs('123')).toThrow(RangeError);
  expect(() => gs1CheckDigit('12a')).toThrow(RangeError);
});
