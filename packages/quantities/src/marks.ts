/** The papers and parties a mark can name; a bare number is a lot. */
export type Marked = { kind: 'lot' | 'memo' | 'customer' | 'weighing' | 'invoice' | 'receipt'; number: string };

const KINDS = { M: 'memo', C: 'customer', W: 'weighing', V: 'invoice', R: 'receipt' } as const;

/** Reads what was scanned or typed: `4127`, `M 20587`, `c118`; null where it is none of these. */
export function readMark(text: string): Marked | null {
  const match = /^([A-Za-z]?)\s*0*([1-9]\d{0,11})([A-Za-z]{0,3})$/.exec(text.trim());
  if (!match) return null;
  const [, letter = '', digits = '', suffix = ''] = match;
  if (letter === '') return { kind: 'lot', number: digits + suffix.toUpperCase() };
  const kind = KINDS[letter.toUpperCase() as keyof typeof KINDS];
  return kind && suffix === '' ? { kind, number: digits } : null;
}
