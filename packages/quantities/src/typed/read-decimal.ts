import { bad, mapReading, type Reading, sayable, typedText } from './reading.js';

/** How a decimal number is read. */
export interface DecimalRules {
  /** Digits after the mark that are kept; the reading is in whole units of the last of them. */
  decimals: number;
  /** What the number is, for the sentences: `Weight`. */
  what: string;
  /** Stands behind the numbers in the sentences: `ct`. */
  unit?: string;
  /** Whether a minus or plus may stand before it. */
  isSigned?: boolean;
  /** Three digits after a lone point may be a thousands mark too: money is written `1.234` by some. */
  pointMayGroup?: boolean;
}

const SIGNED = /^([-+−–]?)\s*(.*)$/s;
// Far under 2^53, so that a sum of thousands of them is still exact.
const MOST_UNITS = 1e15;

/**
 * Reads a decimal number into whole units of its last decimal. Takes thousands in threes (spaces,
 * apostrophes, points or commas), a decimal point or comma, nothing before the mark. `1,234` alone is
 * ambiguous where it can be both.
 */
export function readDecimal(text: string, rules: DecimalRules): Reading<number> {
  const { what, isSigned } = rules;
  const typed = typedText(text, what);
  if (typed.kind !== 'ok') return typed;
  const [, sign = '', bare = ''] = SIGNED.exec(typed.value) ?? [];
  const shapes = asWritten(bare, rules);
  if (shapes === null) {
    return bad(`${what} reads “${sayable(typed.value)}”; a number is needed.`);
  }
  if (sign && !isSigned) return bad(`${what} has a sign before it; write the number alone.`);
  if (shapes.length === 0) {
    return bad(`${what} reads “${bare}”; its points, commas and spaces don’t make one number.`);
  }
  const reading = valuesOf(shapes, bare, rules);
  return /[-−–]/.test(sign) ? mapReading(reading, (value) => -value || 0) : reading;
}

/** What the shapes are worth: one value, two to ask about, or why none can be kept. */
function valuesOf(shapes: readonly Shape[], bare: string, rules: DecimalRules): Reading<number> {
  const { what, decimals, unit } = rules;
  const values = shapes.map((shape) => toUnits(shape, decimals));
  const readings = [...new Set(values.filter((value) => typeof value === 'number'))];
  const [one, other] = readings;
  if (one === undefined) {
    const why =
      values[0] === 'too fine' ? tooFineWords(decimals) : 'is more than can be kept exactly';
    return bad(`${what} “${bare}” ${why}.`);
  }
  if (other === undefined) return { kind: 'ok', value: one };
  const said = readings.map((value) => `${plain(value, decimals)}${unit ? ` ${unit}` : ''}`);
  const why = `${what} “${bare}” can be ${said.join(' or ')}. Write it so that it can be only one.`;
  return { kind: 'ambiguous', readings, why };
}

/** Digits before and after the decimal mark. */
type Shape = readonly [whole: string, rest: string];

/** The ways one text can be a number; none where its marks make none, null where it holds no number. */
function asWritten(bare: string, rules: DecimalRules): Shape[] | null {
  if (!/^[\d.,\s'’]*\d[\d.,\s'’]*$/.test(bare)) return null;
  const spaced = /[\s'’]/.test(bare);
  const marks = [...bare.matchAll(/[.,]/g)];
  const last = marks.at(-1);
  if (last === undefined) return groupsOf(bare).map((whole) => [whole, ''] as const);
  const [before, after] = [bare.slice(0, last.index), bare.slice(last.index + 1)];
  if (/\D/.test(after)) return [];
  const others = new Set(marks.slice(0, -1).map(([mark]) => mark));
  if (others.size > 1 || (others.size === 1 && spaced)) return [];
  if (others.has(last[0])) return groupsOf(bare, last[0]).map((whole) => [whole, ''] as const);
  if (others.size === 1)
    return groupsOf(before, [...others][0]).map((whole) => [whole, after] as const);
  return spaced
    ? groupsOf(before).map((whole) => [whole, after] as const)
    : lone(before, after, { mark: last[0], rules });
}

/** One mark, no groups beside it: a decimal mark, or a thousands mark where three digits follow. */
function lone(
  before: string,
  after: string,
  { mark, rules }: { mark: string; rules: DecimalRules },
): Shape[] {
  if (after === '') return [];
  const decimal: Shape = [before, after];
  if (after.length !== 3 || !/^[1-9]\d{0,2}$/.test(before)) return [decimal];
  const thousands: Shape = [before + after, ''];
  // Nobody writes a decimal comma with more decimals than there are: `1,000 pcs` is a thousand.
  if (mark === ',') return rules.decimals < 3 ? [thousands] : [thousands, decimal];
  return rules.pointMayGroup === true ? [thousands, decimal] : [decimal];
}

/** The digits of a number grouped in threes by one mark (any space or apostrophe by default). */
function groupsOf(text: string, mark?: string): string[] {
  const between = mark === undefined ? "[ \\u00a0\\u202f\\u2009'’]" : `\\${mark}`;
  const isGrouped = new RegExp(`^(\\d+|\\d{1,3}(${between}\\d{3})+)$`).test(text);
  return isGrouped ? [text.replace(/\D/g, '')] : [];
}

function toUnits([whole, rest]: Shape, decimals: number): number | 'too fine' | 'too big' {
  const kept = rest.replace(/0+$/, '');
  if (kept.length > decimals) return 'too fine';
  const value = Number(whole + kept.padEnd(decimals, '0'));
  return value < MOST_UNITS ? value : 'too big';
}

/** The number as it would be typed without thousands marks. */
function plain(units: number, decimals: number): string {
  const digits = String(units).padStart(decimals + 1, '0');
  const at = digits.length - decimals;
  return `${digits.slice(0, at)}.${digits.slice(at)}`.replace(/\.?0*$/, '');
}

const tooFineWords = (decimals: number) =>
  decimals === 0 ? 'is not a whole number' : `has more than ${decimals} decimals`;
