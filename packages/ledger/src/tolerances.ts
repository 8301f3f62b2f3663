import type { Step } from '@foldwell/quantities';

/** Tolerances as shipped, in thousandths of a carat; the house's own are frozen on a memo as it is sent. */
export const PARCEL_TOLERANCE = 20;

/** A stone: one step at step 0.01 ct, 0.003 ct at step 0.001. */
export function stoneTolerance(step: Step): number {
  return step === 10 ? 10 : 3;
}

/** Whether a stone's reading agrees with its ledger weight, at which it moves whatever was read. */
export function stoneAgrees(expected: number, found: number, tolerance: number): boolean {
  return Math.abs(found - expected) <= tolerance;
}

/**
 * Whether a parcel's reading is inside tolerance: this restatement, and the signed sum of what its
 * memo line was restated before with it. Restated weight counts as given up, so found less adds.
 */
export function parcelAgrees(
  { expected, restatedBefore }: { expected: number; restatedBefore: number },
  found: number,
  tolerance: number,
): boolean {
  const now = expected - found;
  return Math.abs(now) <= tolerance && Math.abs(restatedBefore + now) <= tolerance;
}

/**
 * Whether what a lot was restated since its last count stays inside: tolerance for each weighing, or
 * a thousandth of the weight weighed if that is larger.
 */
export function lotAgrees(
  restated: number,
  since: { weighings: number; weightWeighed: number },
  tolerance: number,
): boolean {
  const size = Math.abs(restated);
  return size <= tolerance * since.weighings || size * 1000 <= since.weightWeighed;
}

/** Whether a sorting loss is inside 0.4 % of the weight sorted: its cost stays with the parts. */
export function sortingLossAgrees(lost: number, sorted: number): boolean {
  return lost >= 0 && lost * 1000 <= sorted * 4;
}
