import type { Measurements } from './formula-weight.js';

/** One thing in a lot's particulars that doesn't agree with another; it never blocks. */
export interface Warning {
  code:
    | 'weight by formula'
    | 'depth'
    | 'crown height'
    | 'pavilion depth'
    | 'total depth'
    | 'average'
    | 'sieve';
  sentence: string;
}

/**
 * What is stated of a lot, as far as known. Weight in thousandths of a carat, proportions in % of the
 * diameter, angles in degrees.
 */
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
  /** From `girdleFactor`, where the girdle is given in words. */
  girdleFactor?: number | undefined;
  /** The average stone as the source gives it, in thousandths of a carat; may have a fraction. */
  average?: number | undefined;
  /** Sieve openings in thousandths of a millimetre: stays on, falls through. */
  sieveOn?: number | undefined;
  sieveThrough?: number | undefined;
}
