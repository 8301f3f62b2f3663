/** Colour letters, D first: rank 1 to 23. */
export const COLOURS = [...'DEFGHIJKLMNOPQRSTUVWXYZ'] as const;
/** Clarity, best first: rank 1 to 11. */
export const CLARITIES = ['FL', 'IF', 'VVS1', 'VVS2', 'VS1', 'VS2', 'SI1', 'SI2', 'I1', 'I2', 'I3'] as const;
/** Cut, polish and symmetry, best first: rank 1 to 5. */
export const MAKES = ['Excellent', 'Very Good', 'Good', 'Fair', 'Poor'] as const;
export const MAKE_MARKS = ['EX', 'VG', 'G', 'F', 'P'] as const;
export const FLUORESCENCES = ['None', 'Faint', 'Medium', 'Strong', 'Very Strong'] as const;
export const SHAPES = [
  'Round', 'Oval', 'Pear', 'Cushion', 'Emerald', 'Princess', 'Marquise', 'Baguette', 'Radiant', 'Heart', 'Triangle',
] as const;
export const ORIGINS = ['natural', 'laboratory-grown', 'not tested'] as const;
export type Origin = (typeof ORIGINS)[number];

/** Rank of a grade in its scale, 1 for the best; null where it isn't one. */
export function rankOf(scale: readonly string[], grade: string): number | null {
  const at = scale.findIndex((one) => one.toLowerCase() === grade.trim().toLowerCase());
  return at < 0 ? null : at + 1;
}

/** `G`, or `F–G` for a range; empty without a grade. */
export function rangeWords(scale: readonly string[], from: number | null, to: number | null): string {
  const best = from === null ? '' : (scale[from - 1] ?? '');
  const least = to === null ? best : (scale[to - 1] ?? '');
  return best === least || least === '' ? best : `${best}–${least}`;
}

/** Clarity of the International Diamond Council (IDC Rule Book 2.3) as this house's grade: P1 is I1. */
export function clarityFromInternational(grade: string): string {
  const pique = /^P([123])$/i.exec(grade.trim());
  if (pique) return `I${pique[1]}`;
  return /^(loupe[- ]clean|LC)$/i.test(grade.trim()) ? 'IF' : grade.trim().toUpperCase();
}

const INTERNATIONAL_COLOURS = [
  'exceptional white+', 'exceptional white', 'rare white+', 'rare white', 'white', 'slightly tinted white+',
  'slightly tinted white', 'tinted white+', 'tinted white',
];

/** The international name of a colour letter (IDC Rule Book 3.1.1.2): D exceptional white+, M to Z tinted colour. */
export function internationalColour(letter: string): string | null {
  const rank = rankOf(COLOURS, letter);
  if (rank === null) return null;
  return INTERNATIONAL_COLOURS[rank - 1] ?? 'tinted colour';
}

/**
 * Words a paper must not use for goods grown in a laboratory. ISO 18323:2015 allows `synthetic`,
 * `laboratory-grown` and `laboratory-created` diamond, without abbreviation.
 */
export function isPermittedOriginWording(text: string): boolean {
  return !/\b(lab[\s-]?(grown|created|made)?\s+diamonds?|lab[\s-](grown|created|made)|lgd|cultured diamonds?)\b/i.test(text);
}

/** Full permitted words for a line of a paper: origin, then treatment. */
export function originWords(origin: Origin, treatment: string): string {
  const words = {
    natural: 'natural diamond',
    'laboratory-grown': 'laboratory-grown diamond',
    'not tested': 'diamond, not tested for natural or laboratory-grown origin',
  }[origin];
  return `${words}, ${treatment === '' ? 'no treatment disclosed to us' : `treated: ${treatment}`}`;
}
