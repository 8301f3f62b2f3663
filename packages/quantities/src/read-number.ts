/** What typed text was read as; what could be two things is asked, never guessed. */
export type Reading<T> =
  | { kind: 'ok'; value: T }
  | { kind: 'ambiguous'; readings: T[]; why: string }
  | { kind: 'bad'; why: string };

const MOST_CHARACTERS = 40;

/**
 * Reads a decimal number into whole units of 10^-decimals. Takes spaces, apostrophes, thousands
 * marks and a decimal comma; `1,234` alone is ambiguous where it could be a decimal.
 */
export function readDecimal(text: string, decimals: number, what: string): Reading<number> {
  if (text.length > MOST_CHARACTERS) return { kind: 'bad', why: `${what} is too long to be a number.` };
  const bare = text.replace(/[\s\u00a0\u202f'’]/g, '');
  if (bare === '') return { kind: 'bad', why: `${what} is empty.` };
  if (!/^\d[\d.,]*$/.test(bare)) return { kind: 'bad', why: `${what} reads “${printable(text)}”; a number is needed.` };
  const shapes = asWritten(bare);
  if (shapes.length === 0) return { kind: 'bad', why: `${what} reads “${bare}”; its points and commas don't make one number.` };
  const values = shapes.map(([whole, rest]) => toUnits(whole, rest, decimals));
  const good = values.filter((value) => typeof value === 'number');
  if (good.length > 1 && good[0] !== good[1]) {
    const [one = 0, other = 0] = good;
    return { kind: 'ambiguous', readings: good,
      why: `${what} “${bare}” can be ${plain(one, decimals)} or ${plain(other, decimals)}. Write it with a point.` };
  }
  const [value] = good;
  if (value !== undefined) return { kind: 'ok', value };
  const fine = values[0] === 'too fine';
  return { kind: 'bad', why: fine
    ? `${what} “${bare}” has more than ${decimals} decimals.`
    : `${what} “${bare}” is more than can be kept exactly.` };
}

/** The ways one text can be a number, as digits before and after the decimal mark. */
function asWritten(bare: string): [string, string][] {
  const marks = [...bare].filter((c) => c === '.' || c === ',');
  if (marks.length === 0) return [[bare, '']];
  const last = bare.search(/[.,](?!.*[.,])/);
  const [before, after] = [bare.slice(0, last), bare.slice(last + 1)];
  const kinds = new Set(marks);
  if (kinds.size === 2) {
    const mark = bare[last] === '.' ? ',' : '.';
    return isGrouped(before, mark) ? [[strip(before), after]] : [];
  }
  if (marks.length > 1) return isGrouped(bare, marks[0] ?? ',') ? [[strip(bare), '']] : [];
  const decimal: [string, string] = [before, after];
  // A lone comma before three digits is a thousands mark or a decimal comma; a lone point is a decimal point.
  if (marks[0] === ',' && after.length === 3 && /^[1-9]\d{0,2}$/.test(before)) return [[before + after, ''], decimal];
  return after === '' ? [] : [decimal];
}

const strip = (text: string) => text.replace(/[.,]/g, '');
const isGrouped = (text: string, mark: string) =>
  new RegExp(`^\\d{1,3}(\\${mark}\\d{3})*$`).test(text);

function toUnits(whole: string, rest: string, decimals: number): number | 'too fine' | 'too big' {
  const trimmed = rest.replace(/0+$/, '');
  if (trimmed.length > decimals) return 'too fine';
  const value = Number(whole + trimmed.padEnd(decimals, '0'));
  return Number.isSafeInteger(value) && value < 1e15 ? value : 'too big';
}

const plain = (units: number, decimals: number) => {
  const text = String(units).padStart(decimals + 1, '0');
  const at = text.length - decimals;
  return decimals === 0 ? text : `${text.slice(0, at)}.${text.slice(at)}`.replace(/\.?0+$/, '');
};

const printable = (text: string) => [...text].filter((c) => c >= ' ' && c !== '\u007f').join('');
