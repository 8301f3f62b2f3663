import { type Measurements, weightByFormula } from './formula-weight.js';
import { crownHeightPercent, depthPercent, pavilionDepthPercent } from './proportions.js';
import { formatCarats } from './weight.js';

export * from './formula-weight.js';
export * from './proportions.js';

/** One thing in a lot's particulars that doesn't agree with another; it never blocks. */
export interface Warning {
  code: 'weight by formula' | 'depth' | 'crown height' | 'pavilion depth' | 'total depth' | 'sieve';
  sentence: string;
}

/** What is stated of a lot, as far as known. Weight in thousandths of a carat, proportions in %, angles in degrees. */
export interface Stated {
  shape: string;
  weight: number;
  pieces: number;
  measured?: Measurements | undefined;
  table?: number | undefined;
  depth?: number | undefined;
  crownAngle?: number | undefined;
  crownHeight?: number | undefined;
  pavilionAngle?: number | undefined;
  pavilionDepth?: number | undefined;
  girdle?: number | undefined;
  culet?: number | undefined;
  /** Sieve openings in thousandths of a millimetre: stays on, falls through. */
  sieveOn?: number | undefined;
  sieveThrough?: number | undefined;
}

/** All checks that a lot's own numbers allow, each with its reason. `formulaPercent` is the house's. */
export function warningsOf(stated: Stated, formulaPercent = 10): Warning[] {
  return [
    ...weightWarning(stated, formulaPercent), ...depthWarning(stated), ...proportionWarnings(stated), ...sieveWarning(stated),
  ];
}

function weightWarning(stated: Stated, formulaPercent: number): Warning[] {
  if (stated.pieces !== 1 || !stated.measured) return [];
  const carats = weightByFormula(stated.shape, stated.measured);
  if (carats === null) return [];
  const off = (100 * (carats * 1000 - stated.weight)) / stated.weight;
  if (Math.abs(off) <= formulaPercent) return [];
  return [{ code: 'weight by formula', sentence:
    `The measurements make about ${carats.toFixed(2)} ct by formula, ${percent(Math.abs(off))} ${off > 0 ? 'over' : 'under'} the ${formatCarats(stated.weight)} ct given.` }];
}

function depthWarning({ measured, depth }: Stated): Warning[] {
  if (!measured || depth === undefined) return [];
  const computed = depthPercent(measured.a, measured.b, measured.depth);
  if (Math.abs(computed - depth) <= 1) return [];
  return [{ code: 'depth', sentence: `Depth is given as ${depth} %, the measurements make ${computed.toFixed(1)} %.` }];
}

/** Tolerances 0.7, 0.5 and 1.0 % of the diameter: the rounding of reports, from memory. */
function proportionWarnings(stated: Stated): Warning[] {
  if (stated.shape !== 'Round') return [];
  const crown = stated.table !== undefined && stated.crownAngle !== undefined
    ? crownHeightPercent(stated.table, stated.crownAngle) : undefined;
  const pavilion = stated.pavilionAngle !== undefined
    ? pavilionDepthPercent(stated.pavilionAngle, stated.culet ?? 0) : undefined;
  const total = crown !== undefined && pavilion !== undefined && stated.girdle !== undefined
    ? crown + pavilion + stated.girdle : undefined;
  return [
    ...apart('crown height', 'Crown height', stated.crownHeight, crown, 0.7),
    ...apart('pavilion depth', 'Pavilion depth', stated.pavilionDepth, pavilion, 0.5),
    ...apart('total depth', 'Depth', stated.depth, total, 1),
  ];
}

function apart(code: Warning['code'], what: string, given: number | undefined, computed: number | undefined, most: number): Warning[] {
  if (given === undefined || computed === undefined || Math.abs(given - computed) <= most) return [];
  return [{ code, sentence: `${what} is given as ${given} %, the other proportions make ${computed.toFixed(1)} %.` }];
}

/** Average weight against 0.00369 d^3 at the middle of the plates (our own cubic model), 25 % either way. */
function sieveWarning(stated: Stated): Warning[] {
  const { sieveOn, sieveThrough, pieces, weight } = stated;
  if (!sieveOn || !sieveThrough || pieces < 1 || sieveOn < 1100) return [];
  const middle = (sieveOn + sieveThrough) / 2000;
  const expected = 3.69 * middle ** 3;
  const average = weight / pieces;
  if (Math.abs(average / expected - 1) <= 0.25) return [];
  return [{ code: 'sieve', sentence:
    `${pieces} pieces average ${(average / 1000).toFixed(4)} ct; stones of this sieve are about ${(expected / 1000).toFixed(4)} ct.` }];
}

const percent = (value: number) => `${value.toFixed(0)} %`;
