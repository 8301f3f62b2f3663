/**
 * The check value of a Code 128 symbol (ISO/IEC 15417): start value plus each value times its
 * position, modulo 103.
 */
export function code128Check(start: 103 | 104 | 105, values: readonly number[]): number {
  return values.reduce((sum, value, index) => sum + value * (index + 1), start) % 103;
}

/** Values of text in sets A and B for the printable characters both share: ASCII less 32. */
export function code128Values(text: string): number[] {
  return [...text].map((character) => character.charCodeAt(0) - 32);
}
