import { halfAwayFromZero } from '@foldwell/quantities';

/**
 * Cost (minor units) that leaves with a weight, by share of it, half away from zero; the last weight
 * takes all. Weights in thousandths of a carat; throws a RangeError where more leaves than is there.
 */
export function shareOfCost(cost: number, weight: number, whole: number): number {
  if (weight > whole) throw new RangeError(`${weight} cannot leave where ${whole} is`);
  if (weight === 0) return 0;
  return Number(halfAwayFromZero(BigInt(cost) * BigInt(weight), BigInt(whole)));
}
