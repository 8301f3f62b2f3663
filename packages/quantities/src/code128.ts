/** Start values of the three code sets of Code 128. */
export const CODE128_STARTS = { A: 103, B: 104, C: 105 } as const;

/**
 * The check value of a Code 128 symbol (ISO/IEC 15417, from memory): start value plus each value
 * times its position, modulo 103.
 */
export function code128Check(start: 103 | 104 | 105, values: readonly number[]): number {
  return values.reduce((sum, value, index) => sum + value * (index + 1), start) % 103;
}

/**
 * Values of text in set B, and in set A for the printable characters both share: ASCII less 32.
 * Throws a RangeError on a character that has none.
 */
export function code128Values(text: string): number[] {
  return [...text].map((character) => {
    const value = character.charCodeAt(0) - 32;
    if (value < 0 || value > 94) throw new RangeError('Code 128 holds printable ASCII alone');
    return value;
  });
}

/** Values of an even number of digits in set C: two digits each. */
export function code128Pairs(digits: string): number[] {
  if (!/^(\d\d)+$/.test(digits)) throw new RangeError('set C holds pairs of digits');
  return (digits.match(/\d\d/g) ?? []).map(Number);
}
