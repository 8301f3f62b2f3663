/**
 * Shares a whole by weights so that the parts add up to it: each gets its floor, the odd units go
 * to the largest remainders, ties to the first (method of largest remainder, Hamilton's). Weights
 * are whole and not negative; a RangeError is thrown where there is something to share and no weight
 * to share it by, for it would be lost.
 */
export function largestRemainder(total: number, weights: readonly number[]): number[] {
  if (weights.some((weight) => weight < 0))
    throw new RangeError('a share cannot be less than nothing');
  const sum = weights.reduce((all, weight) => all + BigInt(weight), 0n);
  if (sum === 0n) {
    if (total !== 0) throw new RangeError(`there is no weight to share ${total} by`);
    return weights.map(() => 0);
  }
  const size = BigInt(Math.abs(total));
  const parts = weights.map((weight, index) => {
    const product = size * BigInt(weight);
    return { index, share: product / sum, remainder: product % sum };
  });
  const odd = Number(size - parts.reduce((all, part) => all + part.share, 0n));
  const byRemainder = [...parts].sort((a, b) =>
    a.remainder === b.remainder ? a.index - b.index : a.remainder > b.remainder ? -1 : 1,
  );
  for (const part of byRemainder.slice(0, odd)) part.share += 1n;
  return parts.map((part) => Number(part.share) * Math.sign(total) || 0);
}
