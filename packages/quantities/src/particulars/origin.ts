export const ORIGINS = ['natural', 'laboratory-grown', 'not tested'] as const;
export type Origin = (typeof ORIGINS)[number];

const ORIGIN_WORDS: Readonly<Record<Origin, string>> = {
  natural: 'natural diamond',
  'laboratory-grown': 'laboratory-grown diamond',
  'not tested': 'diamond, not tested for natural or laboratory-grown origin',
};

/** Full permitted words for a line of a paper: origin, then treatment. */
export function originWords(origin: Origin, treatment: string): string {
  const told = treatment.trim();
  return `${ORIGIN_WORDS[origin]}, ${told === '' ? 'no treatment disclosed to us' : `treated: ${told}`}`;
}

const SHORTENED =
  /\b(lab[\s-]?(grown|created|made)?\s+diamonds?|lab[\s-]?(grown|created|made)|lgd)\b/i;
const GROWN = /\b(synthetic|laboratory[\s-](grown|created))\b/i;
const NOT_FOR_GROWN = /\b(cultured|real|genuine|precious|natural|gem)\b/i;

/**
 * Whether words about goods may stand on a paper. ISO 18323:2015 permits `synthetic`,
 * `laboratory-grown` and `laboratory-created` diamond, without abbreviation, and keeps `cultured`,
 * `real`, `genuine`, `precious` and `gem` from them.
 */
export function isPermittedOriginWording(text: string): boolean {
  const withoutTest = text.replace(ORIGIN_WORDS['not tested'], '');
  if (SHORTENED.test(withoutTest) || /\bcultured\s+diamonds?\b/i.test(withoutTest)) return false;
  return !(GROWN.test(withoutTest) && NOT_FOR_GROWN.test(withoutTest));
}

/**
 * What has to be said beside a treatment that asks for care: filled cracks and coatings don't take
 * heat, acid or re-polishing (common practice, no source). Null where nothing has to be.
 */
export function careNote(treatment: string): string | null {
  if (/\b(fill|filled|filling)/i.test(treatment)) {
    return 'Filled: no heat, no acid, no ultrasonic bath.';
  }
  return /\bcoat/i.test(treatment) ? 'Coated: no acid, no abrasive, no re-polishing.' : null;
}
