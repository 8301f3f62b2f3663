/**
 * How cost goes, as the house's contract words it; whole minor units of the base currency. Each
 * rule stands apart so that a test can break one and see that the comparison notices.
 */
export interface Rules {
  /** Cost that leaves with `weight` of the `whole`, half away from zero; the last weight takes all. */
  share(cost: number, weight: number, whole: number): number;
  /** A sum over several by largest remainder; equal remainders go to the first. */
  allot(total: number, shares: number[]): number[];
  /** What a restatement carries. */
  restated(share: number): number;
  /** What a write-off carries. */
  writtenOff(share: number): number;
  /** What a sorting loss takes: nothing within tolerance, its share above. */
  sortingLoss(share: number, isWithin: boolean): number;
  /** What of a fee goes into the lot. */
  fee(fee: number): number;
  /** What a write-down takes off the lot. */
  writeDown(amount: number): number;
  /** What of a missing weight's cost comes back to the lot when the difference is accepted. */
  accepted(cost: number): number;
  /** What weight cut away at the workshop takes. */
  cutAway(share: number): number;
  /** What comes back with a credit note: that sale's own cost, not the lot's average now. */
  credited(saleCost: number, averageNow: number): number;
  /** What goods bought from their consignor cost. */
  bought(price: number): number;
  /** What an undone leg carries, given its own cost and its share of what is there now. */
  undone(own: number, shareNow: number): number;
  /** How a corrected price is spread: over what is inside and what is gone, by weight. */
  corrected(inside: number, gone: number): number[];
}

const halfAway = (numerator: bigint, denominator: bigint): number => {
  const size = numerator < 0n ? -numerator : numerator;
  const rounded = (2n * size + denominator) / (2n * denominator);
  return Number(numerator < 0n ? -rounded : rounded);
};

function largestRemainder(total: number, shares: number[]): number[] {
  const sum = shares.reduce((all, share) => all + BigInt(share), 0n);
  const size = BigInt(Math.abs(total));
  const floors = shares.map((share) => Number((size * BigInt(share)) / sum));
  const remainders = shares.map((share) => (size * BigInt(share)) % sum);
  let left = Number(size) - floors.reduce((all, floor) => all + floor, 0);
  const order = shares
    .map((_, index) => index)
    .sort((a, b) => {
      const [x, y] = [remainders[a] ?? 0n, remainders[b] ?? 0n];
      return x === y ? a - b : x > y ? -1 : 1;
    });
  for (const index of order) {
    if (left === 0) break;
    floors[index] = (floors[index] ?? 0) + 1;
    left -= 1;
  }
  return floors.map((floor) => Math.sign(total) * floor || 0);
}

export const RULES: Rules = {
  share: (cost, weight, whole) =>
    weight === whole ? cost : halfAway(BigInt(cost) * BigInt(weight), BigInt(whole)),
  allot: largestRemainder,
  restated: () => 0,
  writtenOff: (share) => share,
  sortingLoss: (share, isWithin) => (isWithin ? 0 : share),
  fee: (fee) => fee,
  writeDown: (amount) => amount,
  accepted: (cost) => cost,
  cutAway: () => 0,
  credited: (saleCost) => saleCost,
  bought: (price) => price,
  undone: (own) => own,
  corrected: (inside, gone) => [inside, gone],
};

const rounded = (total: number, shares: number[]) => {
  const sum = shares.reduce((all, share) => all + share, 0);
  return shares.map((share) => Math.round((total * share) / sum));
};

/** Every rule broken once, by what the break is called. */
export const BROKEN: Record<string, Partial<Rules>> = {
  'cost leaves rounded down': {
    share: (cost, weight, whole) => (weight === whole ? cost : Math.floor((cost * weight) / whole)),
  },
  'cost leaves at a rounded price per carat': {
    share: (cost, weight, whole) => Math.round(Math.round((cost * 1000) / whole) * (weight / 1000)),
  },
  'the last weight leaves a cent behind': {
    share: (cost, weight, whole) =>
      weight === whole ? Math.max(0, cost - 1) : RULES.share(cost, weight, whole),
  },
  'each part of a sum is rounded by itself': { allot: rounded },
  'what is left of a sum goes to the last': {
    allot: (total, shares) => {
      const parts = rounded(total, shares);
      const rest = parts.slice(0, -1).reduce((all, part) => all + part, 0);
      return [...parts.slice(0, -1), total - rest];
    },
  },
  'a restatement takes its share': { restated: (share) => share },
  'a write-off leaves its cost': { writtenOff: () => 0 },
  'a sorting loss within tolerance takes its share': { sortingLoss: (share) => share },
  'a sorting loss above tolerance takes nothing': { sortingLoss: () => 0 },
  'a fee is expense': { fee: () => 0 },
  'a write-down is not posted': { writeDown: () => 0 },
  'an accepted difference takes its cost along': { accepted: () => 0 },
  'what is cut away takes its share': { cutAway: (share) => share },
  'a credit note comes back at the average': { credited: (_own, average) => average },
  'consigned goods are bought for nothing': { bought: () => 0 },
  'an undoing goes by what is there now': { undone: (_own, shareNow) => shareNow },
  'a corrected price falls on what is left alone': { corrected: (inside) => [inside, 0] },
};
