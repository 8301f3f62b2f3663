import type { ParticularsRequest } from '@foldwell/contracts';
import { type Warning, warningsOf } from '@foldwell/quantities';

/** Openings of sieve plates in thousandths of a millimetre: common practice, no source; the house's own later. */
function opening(plate: string | undefined): number | undefined {
  const named: Record<string, number> = { '000': 900, '00': 1000, '0': 1100, '1': 1150 };
  if (!plate) return undefined;
  if (named[plate]) return named[plate];
  const number = Number(plate);
  if (!(number > 1 && number <= 20)) return undefined;
  // Half steps of 0.05 mm up to plate 5.5, of 0.10 mm beyond.
  return number <= 5.5 ? 1150 + (number - 1) * 100 : 1600 + (number - 5.5) * 200;
}

/** The checks of a lot's own numbers; warnings with their reasons, never in the way. */
export function lotWarnings(lot: ParticularsRequest & { weight: number; pieces: number }, formulaPercent: number): Warning[] {
  const { measureA: a, measureB: b, measureDepth: depth } = lot;
  return warningsOf({
    shape: lot.shape ?? '', weight: lot.weight, pieces: lot.pieces,
    measured: a && depth ? { a, b: b ?? a, depth } : undefined,
    ...lot.proportions, sieveOn: opening(lot.sieveFrom), sieveThrough: opening(lot.sieveTo),
  }, formulaPercent);
}
