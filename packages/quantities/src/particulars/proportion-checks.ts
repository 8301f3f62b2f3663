import { crownHeightPercent, pavilionDepthPercent, totalDepthPercent } from './proportions.js';
import type { Stated, Warning } from './stated.js';

/**
 * A round's stated proportions against each other. Tolerances 0.7, 0.5 and 1.0 % of the diameter:
 * what the rounding of reports explains (from memory).
 */
export function proportionChecks(stated: Stated): Warning[] {
  if (stated.shape !== 'Round') return [];
  return [...crownCheck(stated), ...pavilionCheck(stated), ...totalCheck(stated)];
}

function crownCheck({ table, crownAngle, crownHeight }: Stated): Warning[] {
  if (table === undefined || crownAngle === undefined) return [];
  const computed = crownHeightPercent(table, crownAngle);
  return apart({
    code: 'crown height',
    what: 'Crown height',
    given: crownHeight,
    computed,
    most: 0.7,
  });
}

function pavilionCheck({ pavilionAngle, culet, pavilionDepth }: Stated): Warning[] {
  if (pavilionAngle === undefined) return [];
  const computed = pavilionDepthPercent(pavilionAngle, culet);
  return apart({
    code: 'pavilion depth',
    what: 'Pavilion depth',
    given: pavilionDepth,
    computed,
    most: 0.5,
  });
}

function totalCheck({ table, crownAngle, pavilionAngle, girdle, culet, depth }: Stated): Warning[] {
  if (table === undefined || crownAngle === undefined) return [];
  if (pavilionAngle === undefined || girdle === undefined) return [];
  const computed = totalDepthPercent({ table, crownAngle, pavilionAngle, girdle, culet });
  return apart({ code: 'total depth', what: 'Depth', given: depth, computed, most: 1 });
}

interface Compared {
  code: Warning['code'];
  what: string;
  given: number | undefined;
  computed: number;
  most: number;
}

function apart({ code, what, given, computed, most }: Compared): Warning[] {
  if (given === undefined || Math.abs(given - computed) <= most) return [];
  const sentence = `${what} is given as ${given} %, the other proportions make ${computed.toFixed(1)} %.`;
  return [{ code, sentence }];
}
