/** n / d to a whole number, half away from zero; d is more than nothing, or a RangeError is thrown. */
export function halfAwayFromZero(n: bigint, d: bigint): bigint {
  if (d <= 0n) throw new RangeError(`nothing can be divided by ${d}`);
  const size = n < 0n ? -n : n;
  const rounded = (2n * size + d) / (2n * d);
  return n < 0n ? -rounded : rounded;
}
