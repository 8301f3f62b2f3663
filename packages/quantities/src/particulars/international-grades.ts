import { CLARITIES, COLOURS, rankOf } from './grades.js';

/** Clarity of the International Diamond Council, best first (IDC Rule Book, 2.3): FL and IF are one. */
export const INTERNATIONAL_CLARITIES = [
  'Loupe-clean',
  'VVS1',
  'VVS2',
  'VS1',
  'VS2',
  'SI1',
  'SI2',
  'P1',
  'P2',
  'P3',
] as const;

/**
 * An international clarity as this house's grade: P1 is I1, loupe-clean is IF (whether it is FL is
 * lost). Null where it is neither's grade: it stays as written.
 */
export function clarityFromInternational(grade: string): string | null {
  const written = grade.trim().toUpperCase();
  if (/^P[123]$/.test(written)) return `I${written[1]}`;
  if (/^(LOUPE[- ]?CLEAN|LC)$/.test(written)) return 'IF';
  return rankOf(CLARITIES, written) === null ? null : written;
}

const INTERNATIONAL_COLOURS = [
  'exceptional white+',
  'exceptional white',
  'rare white+',
  'rare white',
  'white',
  'slightly tinted white+',
  'slightly tinted white',
  'tinted white+',
  'tinted white',
];

/** The international name of a colour letter (IDC Rule Book, 3.1.1.2): D exceptional white+, M to Z tinted colour. */
export function internationalColour(letter: string): string | null {
  const rank = rankOf(COLOURS, letter);
  if (rank === null) return null;
  return INTERNATIONAL_COLOURS[rank - 1] ?? 'tinted colour';
}
