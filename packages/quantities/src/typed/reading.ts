/**
 * What typed text was read as. What could be two things is asked, never guessed; `why` is a sentence
 * that can stand under the field.
 */
export type Reading<T> =
  | { kind: 'ok'; value: T }
  | { kind: 'ambiguous'; readings: T[]; why: string }
  | Refusal;

interface Refusal {
  kind: 'bad';
  why: string;
}

/** A refusal in words. */
export function bad(why: string): Refusal {
  return { kind: 'bad', why };
}

const MOST_CHARACTERS = 40;

/**
 * The text without what stands around it, or a refusal: nothing after this meets a text long enough
 * to be slow, or one that can't be shown back.
 */
export function typedText(text: string, what: string): { kind: 'ok'; value: string } | Refusal {
  if (text.length > MOST_CHARACTERS) return bad(`${what} is too long to be a number.`);
  const trimmed = text.trim();
  return trimmed === '' ? bad(`${what} is empty.`) : { kind: 'ok', value: trimmed };
}

/** Typed text as it can be said back: no control or direction marks. */
export function sayable(text: string): string {
  return text.replace(/\p{C}/gu, '');
}

/** The same reading with each value marked as what it is. */
export function mapReading<T, U>(reading: Reading<T>, mark: (value: T) => U): Reading<U> {
  if (reading.kind === 'bad') return reading;
  if (reading.kind === 'ok') return { kind: 'ok', value: mark(reading.value) };
  return { ...reading, readings: reading.readings.map(mark) };
}

/** All that a text may be read as. */
export function valuesOf<T>(reading: Reading<T>): T[] {
  if (reading.kind === 'bad') return [];
  return reading.kind === 'ok' ? [reading.value] : reading.readings;
}
