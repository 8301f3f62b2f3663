import { type DraftLine, ReadLineRequest, type ReadLine } from '@foldwell/contracts';
import {
  formatCarats,
  formatMoney,
  formatPieces,
  formatPrice,
  lineAmount,
  pricePerCarat,
  readCarats,
  readMoney,
  readPieces,
  type Reading,
  shortDate,
  type Step,
} from '@foldwell/quantities';
import type { Request } from 'express';
import type { DataSource } from 'typeorm';

import { readBody } from '../../http/body.js';
import type { Answer, Context } from '../../http/route.js';
import { houseToday } from '../lots/list-lots.js';
import { barOf, type LotRecord, lotRow, SELECT_LOT, whatWords } from '../lots/lot-row.js';
import { placeWords } from '../places/place-words.js';
import { consignorDues } from './consignor-due.js';
import { holdingsOf, whoHasIt, type Holding } from './holders.js';

/** What Enter would do with a scan line: a line for the memo, or why not and a way there. */
export async function readLine(req: Request, { db }: Context): Promise<Answer> {
  const request = await readBody(req, ReadLineRequest);
  return { body: await readScan(db, request) };
}

interface House {
  step: Step;
  currency: string;
}

async function readScan(
  db: DataSource,
  { text, party, lines }: ReadLineRequest,
): Promise<ReadLine> {
  const [first = '', ...rest] = text.trim().split(/\s+/);
  const refused = (sentence: string): ReadLine => ({
    says: '',
    warnings: [],
    refusal: { sentence, path: null, pathWords: null },
  });
  if (first === '') return { says: '', warnings: [] };
  const lot = await lotScanned(db, text.trim(), first);
  if (!lot)
    return refused(`${first.slice(0, 40)} not added. No lot or report of ours has that number.`);
  if (lines.some((line) => line.lot === lot.number))
    return refused(`${lot.number} not added. It stands on this memo already; edit its line.`);
  const today = await houseToday(db);
  const holdings = await holdingsOf(db, lot.id);
  const from = holdings.find((holding) => holding.free > 0);
  if (!from) return { says: '', warnings: [], refusal: whoHasIt(lot.number, holdings, today) };
  const [house] = await db.query<(House & { currency: string })[]>(
    `SELECT h.step, coalesce((SELECT currency FROM party WHERE number::text = $1), h.price_currency) AS currency FROM house h`,
    [(party ?? '').replace(/^C\s*/i, '')],
  );
  const parts = lot.reportScanned ? [] : rest;
  const asked = readParts(parts, lot, from, house as House);
  if ('why' in asked) return refused(`${lot.number} not added. ${asked.why}`);
  const line = await lineOf(db, lot, from, { ...asked, currency: (house as House).currency });
  return {
    line,
    says: saysOf(line, from, house as House),
    warnings: await warningsFor(db, lot, today),
  };
}

type Scanned = LotRecord & { reportScanned: boolean };

async function lotScanned(db: DataSource, whole: string, first: string): Promise<Scanned | null> {
  const [byNumber] = await db.query<LotRecord[]>(`${SELECT_LOT} WHERE l.number = upper($1)`, [
    first.slice(0, 20),
  ]);
  if (byNumber) return { ...byNumber, reportScanned: false };
  const [byReport] = await db.query<LotRecord[]>(
    `${SELECT_LOT} WHERE l.is_living AND l.report_number <> '' AND upper(l.report_number) IN (upper($1), upper($2))
       OR l.id IN (SELECT lot_id FROM lot_report WHERE upper(number) = upper($1)) LIMIT 1`,
    [whole.slice(0, 60), first.slice(0, 60)],
  );
  return byReport ? { ...byReport, reportScanned: true } : null;
}

interface Asked {
  weight: number;
  pieces: number;
  price: number | null;
  sum: number | null;
}

/** `4.00`, `13p`, `@960`, `=5000` after the lot, in any order. */
function readParts(
  parts: string[],
  lot: LotRecord,
  from: Holding,
  { step, currency }: House,
): Asked | { why: string } {
  let [weight, pieces]: [number | null, number | null] = [null, null];
  let price: number | null = lot.ask_price === null ? null : Number(lot.ask_price);
  let sum: number | null = null;
  for (const part of parts) {
    const reading: Reading<number> = part.startsWith('@')
      ? readMoney(part.slice(1), currency, 'Price')
      : part.startsWith('=')
        ? readMoney(part.slice(1), currency, 'Sum')
        : /p(cs)?$/i.test(part)
          ? readPieces(part)
          : readCarats(part, step);
    if (reading.kind !== 'ok') return { why: reading.why };
    if (part.startsWith('@')) [price, sum] = [reading.value, null];
    else if (part.startsWith('=')) [price, sum] = [null, reading.value];
    else if (/p(cs)?$/i.test(part)) pieces = reading.value;
    else weight = reading.value;
  }
  const quantity = quantityOf(lot, from, { weight, pieces, step });
  return 'why' in quantity ? quantity : { ...quantity, price, sum };
}

/** Weight and pieces of a line; of an estimated parcel each follows the other by its average. */
function quantityOf(
  lot: LotRecord,
  from: Holding,
  { weight, pieces, step }: { weight: number | null; pieces: number | null; step: number },
): { weight: number; pieces: number } | { why: string } {
  const place = placeWords(from);
  if (lot.kind !== 'parcel') {
    if (weight !== null && weight !== from.weight)
      return { why: `A stone, pair or set goes whole, ${formatCarats(from.weight)} ct.` };
    return { weight: from.weight, pieces: from.pieces };
  }
  const asked =
    weight ??
    (pieces === null
      ? from.free
      : Math.max(step, Math.round((from.weight * pieces) / from.pieces / step) * step));
  if (asked > from.free) return { why: `Only ${formatCarats(from.free)} ct is in ${place}.` };
  if (asked === from.weight) return { weight: asked, pieces: from.pieces };
  const follows = Math.min(
    from.pieces,
    Math.max(1, Math.round((from.pieces * asked) / from.weight)),
  );
  const count = pieces ?? follows;
  if (count > from.pieces) return { why: `Only ${formatPieces(from.pieces)} are in ${place}.` };
  if (pieces === null && !lot.is_estimated)
    return {
      why: `Its pieces are counted: say how many go, such as ${lot.number} ${formatCarats(asked)} ${follows}p.`,
    };
  return { weight: asked, pieces: count };
}

async function lineOf(
  db: DataSource,
  lot: LotRecord,
  from: Holding,
  asked: Asked & { currency: string },
): Promise<DraftLine> {
  const row = lotRow(lot, '9999-12-31', false);
  const isStated = lot.kind === 'stone' && lot.stated_weight !== null;
  const pricedWeight = isStated ? Number(lot.stated_weight) : asked.weight;
  const bar = barOf(lot);
  const price = asked.sum === null ? await inCurrency(db, asked.price, asked.currency, lot) : null;
  return {
    lot: lot.number,
    what: whatWords(row, lot.kind === 'stone' ? formatCarats(pricedWeight) : ''),
    kind: lot.kind,
    isEstimated: lot.is_estimated,
    pieces: asked.pieces,
    weight: asked.weight,
    free: from.free,
    placeId: from.placeId,
    placeWords: placeWords(from),
    price,
    sum: asked.sum,
    pricedWeight,
    amount: asked.sum ?? (price === null ? 0 : lineAmount(price, pricedWeight)),
    after: {
      ...bar,
      [from.kind === 'return desk' ? 'returned' : 'safe']:
        bar[from.kind === 'return desk' ? 'returned' : 'safe'] - asked.weight,
      out: bar.out + asked.weight,
    },
  };
}

/** An asking price stands in the price currency; a memo in another currency takes it at the newest rate. */
async function inCurrency(
  db: DataSource,
  price: number | null,
  currency: string,
  lot: LotRecord,
): Promise<number | null> {
  if (price === null || String(price) !== lot.ask_price) return price;
  const [row] = await db.query<{ price: string | null }[]>(
    'SELECT convert_money($1, price_currency, $2, house_today()) AS price FROM house',
    [price, currency],
  );
  return row?.price == null ? null : Number(row.price);
}

function saysOf(line: DraftLine, from: Holding, { currency }: House): string {
  const parts =
    line.kind === 'parcel'
      ? `${formatCarats(line.weight)} of ${formatCarats(from.free)} ct in ${line.placeWords}, ${formatPieces(line.pieces, line.isEstimated)}`
      : `${formatCarats(line.weight)} ct in ${line.placeWords}`;
  const unit = line.price ?? pricePerCarat(line.amount, line.pricedWeight);
  if (line.price === null && line.sum === null)
    return `${parts}; no price yet, add @ and the price per carat`;
  return `${parts}, ${formatMoney(line.amount, currency)}${unit === null ? '' : ` at ${formatPrice(unit, currency)}`}`;
}

async function warningsFor(db: DataSource, lot: LotRecord, today: string): Promise<string[]> {
  const [back] = lot.owner ? await consignorDues(db, [lot.number]) : [];
  return [
    lot.origin === 'not tested' && 'Not tested for origin.',
    lot.owner &&
      `Consigned by ${lot.owner}${back ? `, due back to them ${shortDate(back.due, today)}` : ''}.`,
  ].filter((one): one is string => Boolean(one));
}
