import type { ParticularsRequest } from '@foldwell/contracts';
import { plateOpening, type Warning, warningsOf } from '@foldwell/quantities';

const opening = (plate: string | undefined) =>
  plate ? (plateOpening(plate) ?? undefined) : undefined;

/** The checks of a lot's own numbers; warnings with their reasons, never in the way. */
export function lotWarnings(
  lot: ParticularsRequest & { weight: number; pieces: number },
  formulaPercent: number,
): Warning[] {
  const { measureA: a, measureB: b, measureDepth: depth } = lot;
  return warningsOf(
    {
      shape: lot.shape ?? '',
      weight: lot.weight,
      pieces: lot.pieces,
      measured: a && depth ? { a, b: b ?? a, depth } : undefined,
      ...lot.proportions,
      sieveOn: opening(lot.sieveFrom),
      sieveThrough: opening(lot.sieveTo),
    },
    formulaPercent,
  );
}
