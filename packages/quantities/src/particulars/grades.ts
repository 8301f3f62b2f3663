/** Colour letters, D first: rank 1 to 23 (scale from memory). */
export const COLOURS = [...'DEFGHIJKLMNOPQRSTUVWXYZ'] as const;

/** Clarity, best first: rank 1 to 11 (scale from memory). `SI3` of some parcels is kept as written, no grade. */
export const CLARITIES = [
  'FL',
  'IF',
  'VVS1',
  'VVS2',
  'VS1',
  'VS2',
  'SI1',
  'SI2',
  'I1',
  'I2',
  'I3',
] as const;

/** Cut, polish and symmetry, best first: rank 1 to 5 (words from memory), and their marks in tables. */
export const MAKES = ['Excellent', 'Very Good', 'Good', 'Fair', 'Poor'] as const;
export const MAKE_MARKS = ['EX', 'VG', 'G', 'F', 'P'] as const;

/** Strengths of fluorescence, weakest first (from memory). */
export const FLUORESCENCES = ['None', 'Faint', 'Medium', 'Strong', 'Very Strong'] as const;

/** Sizes of the culet, smallest first, and their marks (from memory). */
export const CULETS = [
  'None',
  'Very Small',
  'Small',
  'Medium',
  'Slightly Large',
  'Large',
  'Very Large',
  'Extremely Large',
] as const;
export const CULET_MARKS = ['N', 'VS', 'S', 'M', 'SL', 'L', 'VL', 'EL'] as const;

/** Thicknesses of the girdle, thinnest first, and their marks (from memory); given as least to most. */
export const GIRDLES = [
  'Extremely Thin',
  'Very Thin',
  'Thin',
  'Medium',
  'Slightly Thick',
  'Thick',
  'Very Thick',
  'Extremely Thick',
] as const;
export const GIRDLE_MARKS = ['ETN', 'VTN', 'THN', 'MED', 'STK', 'THK', 'VTK', 'ETK'] as const;

/** Intensities of a fancy colour, faintest first (from memory). */
export const FANCY_INTENSITIES = [
  'Faint',
  'Very Light',
  'Light',
  'Fancy Light',
  'Fancy',
  'Fancy Intense',
  'Fancy Vivid',
  'Fancy Deep',
  'Fancy Dark',
] as const;

export const SHAPES = [
  'Round',
  'Oval',
  'Pear',
  'Cushion',
  'Emerald',
  'Princess',
  'Marquise',
  'Baguette',
  'Radiant',
  'Heart',
  'Triangle',
] as const;

/** Rank of a grade in its scale, 1 for the first; null where it isn't one. */
export function rankOf(scale: readonly string[], grade: string): number | null {
  const wanted = grade.trim().toLowerCase();
  const at = scale.findIndex((one) => one.toLowerCase() === wanted);
  return at < 0 ? null : at + 1;
}

/** Rank of a make by its word or mark (`Excellent`, `EX`, `vg`); null where it is neither. */
export function makeRank(make: string): number | null {
  return rankOf(MAKES, make) ?? rankOf(MAKE_MARKS, make);
}
