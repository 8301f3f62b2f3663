import { bringBack, buy, consignIn, type Line, miss, sendOut, together } from '@foldwell/ledger';
import { expect } from 'vitest';

import { type Act, WritingHouse, type Written } from './writing-house.js';

export const DESK = { kind: 'return desk' } as const;
export const QUARANTINE = { kind: 'quarantine' } as const;

/** What the acts around memos and consignors post; the other kinds are written without them. */
export const KINDS_WITH_MEMOS = [
  'bought from consignor',
  'consignment in',
  'credit return',
  'difference answered',
  'difference opened',
  'kept',
  'memo out',
  'memo return',
  'memo void',
  'opening',
  'put away',
  'return to consignor',
  'sale',
  'transfer',
  'un-kept',
];

export interface Id {
  id: number;
}

export const parcel = (ref: string, more: object = {}) => ({
  ref,
  kind: 'parcel',
  origin: 'natural',
  is_estimated: true,
  ...more,
});

export const stone = (ref: string, more: object = {}) => ({
  ref,
  kind: 'stone',
  fixed_pieces: 1,
  origin: 'natural',
  ...more,
});

/** A parcel 8 points short of 4.00 ct on a memo, and the difference that holds them. */
export interface Short {
  line: Line;
  difference: Id;
  lot: Id;
}

export const held = ({ line, lot, difference }: Short) => ({
  lot,
  difference,
  line,
  weight: 80,
  pieces: 2,
});

export const answering = ({ line, difference }: Short, answer: string) => ({
  kind: 'difference answered' as const,
  memoId: line.memoId,
  answers: [{ differenceId: difference.id, answer, reason: 'weighed again' }],
});

/** Acts of a house in which the database must post what the builders' preview says. */
export class Story {
  readonly posted = new Set<string>();

  private constructor(
    readonly house: WritingHouse,
    readonly at: Record<'drawer' | 'show' | 'laboratory' | 'workshop' | 'memo in', Id>,
  ) {}

  static async begin(): Promise<Story> {
    const house = await WritingHouse.open();
    const place = (kind: string) => house.place(kind);
    return new Story(house, {
      drawer: await place('drawer'),
      show: await place('show'),
      laboratory: await place('laboratory'),
      workshop: await place('workshop'),
      'memo in': await place('memo in'),
    });
  }

  /** Writes an act and expects the database to have posted what was previewed. */
  async agree(act: Act, person?: number): Promise<Written> {
    const { previewed, posted, ...written } = await this.house.act(act, person);
    expect(posted).toEqual(previewed);
    expect(posted.length).toBeGreaterThan(1);
    this.posted.add(act.kind);
    return written;
  }

  /** Opening stock in the drawer: weight, pieces and cost of one lot. */
  async takeIn(goods: Goods, lot: { ref: string } = parcel('P')): Promise<Id> {
    const { weight, pieces, cost } = goods;
    const arrival = { lot: { new: lot.ref }, to: this.at.drawer, weight, pieces, share: 1 };
    const legs = buy(cost, [arrival]);
    const { lots } = await this.agree({ kind: 'opening', newLots: [lot], ...legs });
    return { id: lots[lot.ref]?.id ?? 0 };
  }

  /** Goods of the party, consigned in. */
  async takeInConsigned(goods: Omit<Goods, 'cost'>, lot: { ref: string }): Promise<Id> {
    const { weight, pieces } = goods;
    const arrival = { lot: { new: lot.ref }, to: this.at.drawer, weight, pieces };
    const newLots = [{ ...lot, owner_party_id: 1, source_party_id: 1 }];
    const legs = consignIn(this.at['memo in'], [arrival]);
    const { lots } = await this.agree({ kind: 'consignment in', newLots, ...legs });
    return { id: lots[lot.ref]?.id ?? 0 };
  }

  /** Sends part of a lot out on a memo of its own. */
  async send(lot: Id, weight: number, pieces: number): Promise<Line> {
    const lines = [{ lotId: lot.id, price: 100_00, pricedWeight: weight }];
    const { memoId } = await this.agree({
      kind: 'memo out',
      newMemo: { partyId: 1, due: '2099-12-31', currency: 'USD', lines },
      ...sendOut([{ lot, weight, pieces, from: this.at.drawer }]),
    });
    const lineId = await this.house.id('SELECT id FROM memo_line WHERE memo_id = $1', memoId);
    return { lot, memoId, lineId };
  }

  async short(): Promise<Short> {
    const lot = await this.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
    const line = await this.send(lot, 4000, 120);
    const found = { expectedWeight: 4000, foundWeight: 3920 };
    const { differences } = await this.agree({
      kind: 'memo return',
      memoId: line.memoId,
      newDifferences: [{ ref: 'd', lot, lineId: line.lineId, kind: 'short', ...found }],
      ...together(
        bringBack(line, DESK, { weight: 3920, pieces: 118 }),
        miss(line, { new: 'd' }, { weight: 80, pieces: 2 }),
      ),
    });
    return { line, lot, difference: { id: differences.d ?? 0 } };
  }
}

interface Goods {
  weight: number;
  pieces: number;
  cost: number;
}
