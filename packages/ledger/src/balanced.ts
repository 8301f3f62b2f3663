import type { Posting } from './leg.js';

const MEASURES = ['weight', 'pieces', 'cost'] as const;
type Measure = (typeof MEASURES)[number];

/** A movement that would make carats, pieces or cost appear or vanish. */
export class Unbalanced extends Error {
  constructor(
    /** The lot (as JSON), or `conversion` for the place that passes lots into one another. */
    readonly of: string,
    readonly measure: Measure,
    readonly off: number,
  ) {
    super(`${of} is off by ${off} in ${measure}`);
  }
}

/**
 * Every lot of a movement sums to zero in weight, pieces and cost, and the conversion place over all
 * lots. Throws `Unbalanced` with the first that doesn't.
 */
export function assertBalanced(postings: Posting[]): void {
  const sums = new Map<string, Record<Measure, number>>();
  for (const posting of postings) {
    for (const of of sidesOf(posting)) {
      const sum = sums.get(of) ?? { weight: 0, pieces: 0, cost: 0 };
      for (const measure of MEASURES) sum[measure] += posting[measure];
      sums.set(of, sum);
    }
  }
  for (const [of, sum] of sums) {
    const measure = MEASURES.find((one) => sum[one] !== 0);
    if (measure) throw new Unbalanced(of, measure, sum[measure]);
  }
}

function sidesOf({ lot, place }: Posting): string[] {
  const isConversion = 'kind' in place && place.kind === 'conversion';
  return isConversion ? [JSON.stringify(lot), 'conversion'] : [JSON.stringify(lot)];
}
