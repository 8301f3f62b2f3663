import type { ParticularsRequest } from '@foldwell/contracts';

/** Fields with a column of their own; the others live in `particulars`. */
const COLUMNS = {
  shape: 'shape',
  sieveFrom: 'sieve_from',
  sieveTo: 'sieve_to',
  colourFrom: 'colour_from',
  colourTo: 'colour_to',
  fancyColour: 'fancy_colour',
  clarityFrom: 'clarity_from',
  clarityTo: 'clarity_to',
  cut: 'cut',
  polish: 'polish',
  symmetry: 'symmetry',
  fluorescence: 'fluorescence',
  measureA: 'measure_a',
  measureB: 'measure_b',
  measureDepth: 'measure_depth',
  statedWeight: 'stated_weight',
  reportLaboratory: 'report_laboratory',
  reportNumber: 'report_number',
  reportDate: 'report_date',
  miningCountry: 'mining_country',
  miningEvidence: 'mining_evidence',
  ask: 'ask_price',
  floor: 'floor_price',
} as const satisfies Partial<Record<keyof ParticularsRequest, string>>;
const LOOSE = ['inscription', 'shade', 'comments', 'proportions'] as const;

/** What was asked for as columns of the lot, only what was given; report numbers trimmed and in capitals. */
export function columnsOf(request: ParticularsRequest): Record<string, unknown> {
  const columns: Record<string, unknown> = {};
  for (const [field, column] of Object.entries(COLUMNS)) {
    const value = request[field as keyof typeof COLUMNS];
    if (value !== undefined) columns[column] = typeof value === 'string' ? value.trim() : value;
  }
  if (typeof columns.report_number === 'string')
    columns.report_number = columns.report_number.toUpperCase();
  const loose = Object.fromEntries(
    LOOSE.flatMap((field) => (request[field] === undefined ? [] : [[field, request[field]]])),
  );
  return { ...columns, particulars: loose };
}

/** The particulars of a record as the page edits them. */
export function particularsOf(record: Record<string, unknown>): ParticularsRequest {
  const fields = Object.entries(COLUMNS).map(([field, column]) => {
    const value = record[column];
    return [
      field,
      typeof value === 'string' && /^(ask|floor|statedWeight)$/.test(field) ? Number(value) : value,
    ];
  });
  return { ...Object.fromEntries(fields), ...(record.particulars as object) } as ParticularsRequest;
}
