const LETTERS = {
  memo: 'M',
  invoice: 'V',
  receipt: 'R',
  weighing: 'W',
  customer: 'C',
  'credit note': 'K',
  hold: 'H',
  order: 'B',
} as const;

/** What a mark can name; a bare number is a lot. */
export type MarkKind = 'lot' | keyof typeof LETTERS;

export interface Marked {
  kind: MarkKind;
  /** Without leading zeros; a lot's with the letters that split it off (`4127A`). */
  number: string;
}

/**
 * Reads what was scanned or typed: `4127`, `4127A`, `M 20587`, `c118`, `M 20587-1` (a paper appended
 * to the memo); null where it is none of these. A lot that is only digits and one letter is no paper.
 */
export function readMark(text: string): Marked | null {
  if (text.length > 40) return null;
  const typed = text.trim().toUpperCase();
  const lot = /^0*([1-9]\d{0,11}[A-Z]{0,3})$/.exec(typed);
  if (lot?.[1]) return { kind: 'lot', number: lot[1] };
  const paper = /^([A-Z])\s*0*([1-9]\d{0,11})(-\d{1,3})?$/.exec(typed);
  const [, letter, number = '', appended] = paper ?? [];
  const kind = (Object.keys(LETTERS) as (keyof typeof LETTERS)[]).find(
    (one) => LETTERS[one] === letter,
  );
  if (kind === undefined || (appended !== undefined && kind !== 'memo')) return null;
  return { kind, number };
}

/** `M 20587`; a lot is bare, `4127`. */
export function formatMark({ kind, number }: Marked): string {
  return kind === 'lot' ? number : `${LETTERS[kind]} ${number}`;
}
