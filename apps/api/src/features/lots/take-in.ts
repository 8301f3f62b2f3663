import { type TakeInLot, TakeInRequest, type TakenIn } from '@foldwell/contracts';
import { type Arrival, buy, consignIn } from '@foldwell/ledger';
import { lineAmount, statedWeight, type MilliCarats } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import type { Act } from '../ledger/act.js';
import { type Key, keyOf, postAct } from '../ledger/post-act.js';
import { lotWarnings } from './lot-warnings.js';
import { columnsOf } from './particulars-columns.js';

/** Goods come in: opening stock, bought, or consigned in; each gets its number and its first reading. */
export async function takeIn(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, TakeInRequest);
  return { status: 201, body: await takeInLots(ctx, keyOf(req, ctx), request) };
}

/** The act itself, as people and the demo house do it. */
export async function takeInLots(ctx: Context, key: Key, request: TakeInRequest): Promise<TakenIn> {
  const { step, formula } = await houseRules(ctx);
  refuseOddLots(request, step);
  const party = await partyOf(ctx, request);
  const isConsigned = request.how === 'consignment in';
  const act: Act = {
    kind: request.how,
    businessDate: request.businessDate,
    paper: request.paper,
    partyId: party?.id,
    newLots: request.lots.map((lot, index) => newLot(lot, index, { party, isConsigned })),
    weighings: request.lots.map((lot, index) => ({
      lot: { new: ref(index) },
      purpose: 'taken in',
      weight: lot.weight,
      pieces: lot.pieces,
      reportRead: lot.reportNumber,
    })),
    ...(isConsigned
      ? {
          newPlaces: [
            {
              ref: 'memo in',
              kind: 'memo in',
              name: `${request.paper || 'In'}, ${party?.name}`,
              partyId: party?.id ?? '',
              due: request.due,
            },
          ],
          ...consignIn({ new: 'memo in' }, request.lots.map(arrival)),
        }
      : buy(
          costOf(request),
          request.lots.map((lot, index) => ({
            ...arrival(lot, index),
            share: shareOf(request, lot),
          })),
        )),
  };
  const written = await postAct(ctx, key, act);
  const numbers = request.lots.map((_, index) => written.lots[ref(index)]?.number ?? '');
  const warnings = request.lots.flatMap((lot, index) => {
    const sentences = lotWarnings(lot, formula).map((warning) => warning.sentence);
    return sentences.length > 0 ? [{ number: numbers[index] ?? '', sentences }] : [];
  });
  return { movementId: String(written.movementId), numbers, warnings };
}

const ref = (index: number) => `lot ${index}`;
const arrival = (lot: TakeInLot, index: number): Omit<Arrival, 'share'> => ({
  lot: { new: ref(index) },
  to: { id: Number(lot.place) },
  weight: lot.weight,
  pieces: lot.pieces,
});

const costOfLot = (lot: TakeInLot) =>
  lot.sum ?? (lot.price === undefined ? 0 : lineAmount(lot.price, lot.weight));
const costOf = (request: TakeInRequest) =>
  request.boxPrice ?? request.lots.reduce((sum, lot) => sum + costOfLot(lot), 0);

/** A box price goes by worth or by weight; single prices each stay with their own lot. */
function shareOf(request: TakeInRequest, lot: TakeInLot): number {
  if (request.boxPrice === undefined) return costOfLot(lot);
  return request.shareBy === 'worth' ? lineAmount(lot.ask ?? 0, lot.weight) : lot.weight;
}

function refuseOddLots(request: TakeInRequest, step: number): void {
  const fields = request.lots.flatMap((lot, index) => {
    const at = `lots.${index}`;
    const problems: { field: string; message: string }[] = [];
    if (lot.weight % step !== 0)
      problems.push({
        field: `${at}.weight`,
        message: 'Three decimals; this house’s balance reads to 0.01 ct.',
      });
    if (lot.kind === 'stone' && lot.pieces !== 1)
      problems.push({ field: `${at}.pieces`, message: 'A stone is one piece.' });
    if (lot.kind === 'pair' && lot.pieces < 2)
      problems.push({ field: `${at}.pieces`, message: 'A pair or set has two pieces or more.' });
    if (
      request.how !== 'consignment in' &&
      request.boxPrice === undefined &&
      lot.price === undefined &&
      lot.sum === undefined
    ) {
      problems.push({
        field: `${at}.price`,
        message: 'Say what it cost, for a carat or as a sum.',
      });
    }
    if (request.how === 'consignment in' && (lot.price !== undefined || lot.sum !== undefined)) {
      problems.push({
        field: `${at}.price`,
        message: 'Goods consigned in carry no cost; the agreed price goes into the comments.',
      });
    }
    if (!/^\d{1,18}$/.test(lot.place))
      problems.push({ field: `${at}.place`, message: 'Say where it goes.' });
    return problems;
  });
  if (fields.length > 0) throw new ValidationFailed(fields);
}

function newLot(
  lot: TakeInLot,
  index: number,
  from: { party: FoundParty | null; isConsigned: boolean },
): Record<string, unknown> {
  const stated =
    lot.statedWeight ??
    (lot.kind === 'stone' && lot.reportNumber ? statedWeight(lot.weight as MilliCarats) : null);
  return {
    ref: ref(index),
    kind: lot.kind,
    origin: lot.origin,
    treatment: lot.treatment?.trim() ?? '',
    fixed_pieces: lot.kind === 'parcel' ? null : lot.pieces,
    is_estimated: lot.kind === 'parcel' && lot.isEstimated === true,
    owner_party_id: from.isConsigned ? from.party?.id : null,
    source_party_id: from.party?.id ?? null,
    ...columnsOf(lot),
    stated_weight: stated,
    particulars: {
      ...(columnsOf(lot).particulars as object),
      ...(lot.members && { members: lot.members }),
    },
    reports: (lot.members ?? [])
      .filter((member) => member.report)
      .map((member) => ({
        laboratory: member.laboratory ?? '',
        number: member.report,
        standing: 'member',
      })),
  };
}

interface FoundParty {
  id: string;
  name: string;
}

async function partyOf({ db }: Context, request: TakeInRequest): Promise<FoundParty | null> {
  if (request.how === 'opening') return null;
  const part = request.how === 'purchase' ? 'is_supplier' : 'is_consignor';
  const [party] = await db.query<FoundParty[]>(
    `SELECT id, name FROM party WHERE number::text = $1 AND ${part}`,
    [request.party ?? ''],
  );
  if (!party)
    throw new RuleBroken(
      'party_missing',
      request.how === 'purchase'
        ? 'Say which supplier it was bought from.'
        : 'Say which consignor it belongs to.',
    );
  return party;
}

async function houseRules({ db }: Context): Promise<{ step: number; formula: number }> {
  const [house] = await db.query<{ step: number; formula: number }[]>(
    'SELECT step, formula_percent AS formula FROM house',
  );
  return house ?? { step: 10, formula: 10 };
}
