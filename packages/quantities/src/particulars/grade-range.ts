import { bad, type Reading, sayable, typedText } from '../typed/reading.js';
import { rankOf } from './grades.js';

/** Ranks of a scale, the better first; the same twice for one grade. */
export interface GradeRange {
  from: number;
  to: number;
}

/** Reads `G`, `D-J`, `VVS2–SI2` on a scale, either end first. */
export function readGradeRange(
  scale: readonly string[],
  text: string,
  what = 'Grade',
): Reading<GradeRange> {
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const ends = typed.value.split(/\s*(?:[-–—/]|\bto\b)\s*/i);
  const ranks = ends.map((end) => rankOf(scale, end));
  const [one = null, other = one] = ranks;
  if (ends.length > 2 || one === null || other === null) {
    const [first, last] = [scale[0] ?? '', scale.at(-1) ?? ''];
    return bad(`${what} reads “${sayable(typed.value)}”; it goes from ${first} to ${last}.`);
  }
  return { kind: 'ok', value: { from: Math.min(one, other), to: Math.max(one, other) } };
}

/** Whether a range of ranks holds a rank. */
export function rangeHolds({ from, to }: GradeRange, rank: number): boolean {
  return from <= rank && rank <= to;
}

/** `G`, or `F–G` for a range of ranks; empty without a grade. */
export function rangeWords(
  scale: readonly string[],
  from: number | null,
  to: number | null,
): string {
  const best = from === null ? '' : (scale[from - 1] ?? '');
  const least = to === null ? best : (scale[to - 1] ?? '');
  return best === least || least === '' ? best : `${best}–${least}`;
}
