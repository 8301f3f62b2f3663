/** Measurements in thousandths of a millimetre: least and greatest diameter, or length and width; depth. */
export interface Measurements {
  a: number;
  b: number;
  depth: number;
}

/** Corrections of a weight by formula; 1 where there is nothing to correct. */
export interface Corrections {
  girdleFactor?: number;
  shapeFactor?: number;
}

interface Formula {
  /** Whether the mean of both measures is squared (round, oval) or they are multiplied. */
  usesMean: boolean;
  /** Factors by length to width; one row for all where only one is given. */
  factors: readonly (readonly [ratio: number, factor: number])[];
}

const single = (factor: number, usesMean = false): Formula => ({
  usesMean,
  factors: [[1, factor]],
});

/**
 * Factors of "Estimating Mounted Diamond Weight", chapter 11 of an anonymous web course on diamonds
 * (round 11.11, oval, marquise, triangle 11.21); pear, emerald, heart, baguette, princess, radiant
 * and cushion from memory. Estimates only.
 */
const FORMULAS: Readonly<Record<string, Formula>> = {
  Round: single(0.0061, true),
  Oval: single(0.0062, true),
  Marquise: {
    usesMean: false,
    factors: [
      [1.5, 0.00565],
      [1.75, 0.0057],
      [2, 0.0058],
      [2.25, 0.00583],
      [2.5, 0.00585],
      [2.75, 0.0059],
      [3, 0.00595],
    ],
  },
  Triangle: single(0.0057),
  Pear: {
    usesMean: false,
    factors: [
      [1.25, 0.00615],
      [1.5, 0.006],
      [1.66, 0.0059],
      [2, 0.00575],
    ],
  },
  Emerald: {
    usesMean: false,
    factors: [
      [1, 0.008],
      [1.5, 0.0092],
      [2, 0.01],
      [2.5, 0.0106],
    ],
  },
  Heart: single(0.0059),
  Baguette: single(0.00915),
  Princess: single(0.0083),
  Radiant: single(0.0081),
  Cushion: single(0.0082),
};

/** Length to width, the longer over the shorter. */
export function lengthToWidth(a: number, b: number): number {
  return Math.max(a, b) / Math.min(a, b);
}

/**
 * Weight in carats from measurements; null for a shape without a formula. An estimate: floating
 * point is right here, for nothing is ever booked on it.
 */
export function weightByFormula(
  shape: string,
  measured: Measurements,
  { girdleFactor = 1, shapeFactor = 1 }: Corrections = {},
): number | null {
  const formula = Object.hasOwn(FORMULAS, shape) ? FORMULAS[shape] : undefined;
  if (!formula) return null;
  const [a, b, depth] = [measured.a / 1000, measured.b / 1000, measured.depth / 1000];
  const ratio = lengthToWidth(a, b);
  const nearest = formula.factors.reduce((best, row) =>
    Math.abs(row[0] - ratio) < Math.abs(best[0] - ratio) ? row : best,
  );
  const spread = formula.usesMean ? ((a + b) / 2) ** 2 : a * b;
  return spread * depth * nearest[1] * girdleFactor * shapeFactor;
}
