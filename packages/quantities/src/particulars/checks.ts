import { formatCarats } from '../weights/format-weight.js';
import { type Measurements, weightByFormula } from './formula-weight.js';
import { proportionChecks } from './proportion-checks.js';
import { depthOfWidthPercent, depthPercent } from './proportions.js';
import { roundOfDiameter } from './sieve.js';
import type { Stated, Warning } from './stated.js';

/**
 * All checks that a lot's own numbers allow, each with its reason; none of them blocks.
 * `formulaPercent` is how far a weight by formula may lie off, the house's setting.
 */
export function warningsOf(stated: Stated, formulaPercent = 10): Warning[] {
  const { measured } = stated;
  return [
    ...(measured ? weightWarning(stated, measured, formulaPercent) : []),
    ...(measured ? depthWarning(stated, measured) : []),
    ...proportionChecks(stated),
    ...averageWarning(stated),
    ...sieveWarning(stated),
  ];
}

function weightWarning(stated: Stated, measured: Measurements, most: number): Warning[] {
  if (stated.pieces !== 1 || stated.weight <= 0) return [];
  const { girdleFactor } = stated;
  const carats = weightByFormula(
    stated.shape,
    measured,
    girdleFactor === undefined ? {} : { girdleFactor },
  );
  if (carats === null) return [];
  const off = (100 * (carats * 1000 - stated.weight)) / stated.weight;
  if (Math.abs(off) <= most) return [];
  const apart = `${Math.abs(off).toFixed(0)} % ${off > 0 ? 'over' : 'under'}`;
  const given = formatCarats(stated.weight);
  const sentence = `The measurements make about ${carats.toFixed(2)} ct by formula, ${apart} the ${given} ct given.`;
  return [{ code: 'weight by formula', sentence }];
}

function depthWarning({ shape, depth }: Stated, { a, b, depth: z }: Measurements): Warning[] {
  if (depth === undefined) return [];
  const computed = shape === 'Round' ? depthPercent(a, b, z) : depthOfWidthPercent(a, b, z);
  if (Math.abs(computed - depth) <= 1) return [];
  const sentence = `Depth is given as ${depth} %, the measurements make ${computed.toFixed(1)} %.`;
  return [{ code: 'depth', sentence }];
}

/** A tenth either way (common practice, no source): an average size is said to one or two figures. */
function averageWarning({ average, pieces, weight }: Stated): Warning[] {
  if (average === undefined || average <= 0 || pieces < 1 || weight <= 0) return [];
  const expected = average * pieces;
  if (Math.abs(expected / weight - 1) <= 0.1) return [];
  const made = formatCarats(Math.round(expected));
  const each = (average / 1000).toFixed(4);
  const sentence = `${pieces} pieces of ${each} ct make ${made} ct, not the ${formatCarats(weight)} ct given.`;
  return [{ code: 'average', sentence }];
}

/** Average weight against the middle of the plates by our own cubic model, 25 % either way from 1.1 mm up. */
function sieveWarning({ sieveOn, sieveThrough, pieces, weight }: Stated): Warning[] {
  if (!sieveOn || !sieveThrough || pieces < 1 || sieveOn < 1100) return [];
  const expected = roundOfDiameter((sieveOn + sieveThrough) / 2);
  const average = weight / pieces / 1000;
  if (Math.abs(average / expected - 1) <= 0.25) return [];
  const about = `stones of this sieve are about ${expected.toFixed(4)} ct`;
  const sentence = `${pieces} pieces average ${average.toFixed(4)} ct; ${about}.`;
  return [{ code: 'sieve', sentence }];
}
