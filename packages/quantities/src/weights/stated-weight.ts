import { type MilliCarats, milliCarats, type Step } from './milli-carats.js';

/**
 * The weight a laboratory states for a single stone: hundredths go up only from nine thousandths,
 * 1.768 is 1.76 and 1.769 is 1.77 (Gemological Institute of America, FAQ "How is diamond carat
 * weight rounded?"). Parcels keep the balance's figure; stated weights are never summed.
 */
export function statedWeight(weight: MilliCarats): MilliCarats {
  const hundredths = Math.floor(weight / 10) + (weight % 10 === 9 ? 1 : 0);
  return milliCarats(hundredths * 10);
}

/** Whether a stone on our balance agrees with its report; at step 0.01 one hundredth away also does. */
export function agreesWithReport(found: MilliCarats, stated: MilliCarats, step: Step): boolean {
  const apart = Math.abs(statedWeight(found) - statedWeight(stated));
  return step === 10 ? apart <= 10 : apart === 0;
}
