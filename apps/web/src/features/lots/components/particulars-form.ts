import type { ParticularsRequest } from '@foldwell/contracts';
import {
  CLARITIES,
  COLOURS,
  formatAmount,
  formatCarats,
  MAKE_MARKS,
  rangeWords,
  rankOf,
  readCarats,
  readDecimal,
  readMillimetres,
  readMoney,
} from '@foldwell/quantities';

/** Particulars as typed; read only when they are kept, so nothing typed is ever lost. */
export interface ParticularsForm {
  shape: string;
  sieve: string;
  colour: string;
  clarity: string;
  cut: string;
  polish: string;
  symmetry: string;
  fluorescence: string;
  measures: string;
  depth: string;
  table: string;
  crownAngle: string;
  pavilionAngle: string;
  laboratory: string;
  report: string;
  stated: string;
  country: string;
  evidence: string;
  inscription: string;
  comments: string;
  ask: string;
  floor: string;
}

export const EMPTY_PARTICULARS: ParticularsForm = {
  shape: 'Round',
  sieve: '',
  colour: '',
  clarity: '',
  cut: '',
  polish: '',
  symmetry: '',
  fluorescence: '',
  measures: '',
  depth: '',
  table: '',
  crownAngle: '',
  pavilionAngle: '',
  laboratory: '',
  report: '',
  stated: '',
  country: '',
  evidence: '',
  inscription: '',
  comments: '',
  ask: '',
  floor: '',
};

const mark = (rank: number | null | undefined) => (rank ? (MAKE_MARKS[rank - 1] ?? '') : '');
const words = (text: string | undefined) => text ?? '';
const mm = (value: number | null | undefined) => (value ? (value / 1000).toString() : '');

/** What is written now, as it would be typed. */
export function particularsForm(from: ParticularsRequest, currency: string): ParticularsForm {
  const plain = (amount: number | null | undefined) =>
    amount == null ? '' : formatAmount(amount, currency, true).replaceAll(',', '');
  return {
    shape: words(from.shape),
    sieve: [from.sieveFrom && `+${from.sieveFrom}`, from.sieveTo && `-${from.sieveTo}`]
      .filter(Boolean)
      .join(' '),
    colour:
      from.fancyColour ||
      rangeWords(COLOURS, from.colourFrom ?? null, from.colourTo ?? null).replace('–', '-'),
    clarity: rangeWords(CLARITIES, from.clarityFrom ?? null, from.clarityTo ?? null).replace(
      '–',
      '-',
    ),
    cut: mark(from.cut),
    polish: mark(from.polish),
    symmetry: mark(from.symmetry),
    fluorescence: words(from.fluorescence),
    measures: [mm(from.measureA), mm(from.measureB), mm(from.measureDepth)]
      .filter(Boolean)
      .join(' x '),
    ...proportionsForm(from.proportions),
    laboratory: words(from.reportLaboratory),
    report: words(from.reportNumber),
    stated: from.statedWeight ? formatCarats(from.statedWeight).replaceAll(',', '') : '',
    country: words(from.miningCountry),
    evidence: words(from.miningEvidence),
    inscription: words(from.inscription),
    comments: words(from.comments),
    ask: plain(from.ask),
    floor: plain(from.floor),
  };
}

function proportionsForm(proportions: ParticularsRequest['proportions'] = {}) {
  const { depth = '', table = '', crownAngle = '', pavilionAngle = '' } = proportions;
  return {
    depth: String(depth),
    table: String(table),
    crownAngle: String(crownAngle),
    pavilionAngle: String(pavilionAngle),
  };
}

interface Read {
  request: ParticularsRequest;
  problems: Record<string, string>;
}

/** Reads what was typed; each field that can't be read says why. */
export function readParticulars(form: ParticularsForm, currency: string): Read {
  const problems: Record<string, string> = {};
  const range = (
    name: 'colour' | 'clarity',
    scale: readonly string[],
  ): [number | null, number | null] => {
    const [from = '', to = from] = form[name].trim().split(/\s*[-–]\s*/);
    if (from === '') return [null, null];
    const ranks = [rankOf(scale, from), rankOf(scale, to)];
    if (ranks.includes(null))
      problems[name] =
        `${form[name]} is not a ${name} or a range of it, such as ${scale[3]} or ${scale[3]}-${scale[5]}.`;
    const [a, b] = ranks.map((rank) => rank ?? 1) as [number, number];
    return [Math.min(a, b), Math.max(a, b)];
  };
  const isFancy = /fancy|faint|intense|vivid/i.test(form.colour);
  const [colourFrom, colourTo] = isFancy ? [null, null] : range('colour', COLOURS);
  const [clarityFrom, clarityTo] = range('clarity', CLARITIES);
  const money = (name: 'ask' | 'floor') => {
    if (form[name].trim() === '') return null;
    const reading = readMoney(form[name], currency, name === 'ask' ? 'Ask' : 'Floor');
    if (reading.kind !== 'ok') problems[name] = reading.why;
    return reading.kind === 'ok' ? reading.value : null;
  };
  const make = (name: 'cut' | 'polish' | 'symmetry') =>
    form[name] === '' ? null : rankOf(MAKE_MARKS, form[name]);
  const sieve = /^\s*(?:\+\s*([\d.]+))?\s*(?:[-−–]\s*([\d.]+))?\s*$/.exec(form.sieve);
  if (!sieve) problems.sieve = `${form.sieve} is not a sieve, such as +6.5 -11.`;
  const [measureA, measureB, measureDepth] = measures(form.measures, problems);
  return {
    problems,
    request: {
      shape: form.shape,
      sieveFrom: sieve?.[1] ?? '',
      sieveTo: sieve?.[2] ?? '',
      colourFrom,
      colourTo,
      fancyColour: isFancy ? form.colour.trim() : '',
      clarityFrom,
      clarityTo,
      cut: make('cut'),
      polish: make('polish'),
      symmetry: make('symmetry'),
      fluorescence: form.fluorescence,
      measureA,
      measureB,
      measureDepth,
      statedWeight: stated(form.stated, problems),
      reportLaboratory: form.report.trim() ? form.laboratory : '',
      reportNumber: form.report,
      miningCountry: form.country,
      miningEvidence: form.evidence,
      inscription: form.inscription,
      comments: form.comments,
      proportions: proportions(form, problems),
      ask: money('ask'),
      floor: money('floor'),
    },
  };
}

function stated(text: string, problems: Record<string, string>): number | null {
  if (text.trim() === '') return null;
  const reading = readCarats(text, 1, 'Stated weight');
  if (reading.kind !== 'ok') problems.stated = reading.why;
  return reading.kind === 'ok' ? reading.value : null;
}

function measures(text: string, problems: Record<string, string>): (number | null)[] {
  if (text.trim() === '') return [null, null, null];
  const parts = text.trim().split(/\s*(?:x|\*|×|[-–])\s*/i);
  const readings = parts.map((part) => readMillimetres(part));
  const bad = readings.find((reading) => reading.kind !== 'ok');
  if (bad || parts.length !== 3)
    problems.measures =
      bad && 'why' in bad ? bad.why : 'Three measures in mm, such as 6.42-6.45 x 3.98.';
  return readings.map((reading) => (reading.kind === 'ok' ? reading.value : null));
}

const PROPORTIONS = {
  depth: 'Depth',
  table: 'Table',
  crownAngle: 'Crown angle',
  pavilionAngle: 'Pavilion angle',
} as const;
const MOST_OF_A_PROPORTION = 120;

/** In percent or degrees, to hundredths, as reports state them. */
function proportions(
  form: ParticularsForm,
  problems: Record<string, string>,
): NonNullable<ParticularsRequest['proportions']> {
  const read: Record<string, number> = {};
  for (const name of Object.keys(PROPORTIONS) as (keyof typeof PROPORTIONS)[]) {
    const text = form[name].replace(/[%°]\s*$/, '');
    if (text.trim() === '') continue;
    const what = PROPORTIONS[name];
    const reading = readDecimal(text, { decimals: 2, what });
    if (reading.kind !== 'ok') problems[name] = reading.why;
    else if (reading.value === 0 || reading.value > MOST_OF_A_PROPORTION * 100)
      problems[name] = `${what} ${form[name].trim()} does not fit a stone.`;
    else read[name] = reading.value / 100;
  }
  return read;
}
