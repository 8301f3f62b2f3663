import Papa from 'papaparse';

/** Text that a spreadsheet could take for a formula gets a leading quote mark; numbers stay numbers. */
function guarded(cell: unknown): unknown {
  if (typeof cell !== 'string') return cell;
  return /^[\s\u0000\u200b-\u200f\ufeff]*[=+\-@\t\r\n\u0000＝＋－＠]/.test(cell)
    ? `'${cell}`
    : cell;
}

/** Rows as CSV by RFC 4180: CRLF, every text quoted, nothing that runs when it is opened. */
export function toCsv(fields: string[], rows: unknown[][]): string {
  const quotes = fields.map(() => true);
  return `\ufeff${Papa.unparse(
    { fields, data: rows.map((row) => row.map(guarded)) },
    {
      newline: '\r\n',
      quotes: (value: unknown) => typeof value === 'string' || quotes.length === 0,
    },
  )}\r\n`;
}
