import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { type Body, HouseOverHttp, PARCEL } from '../support/house-over-http.js';

let house: HouseOverHttp;
let melee = '';
let counted = '';
let stone = '';
let theirs = '';
beforeAll(async () => {
  house = await HouseOverHttp.open();
  [melee = '', counted = '', stone = ''] = await house.takeIn(
    { ...PARCEL, weight: 48_620, pieces: 3214 },
    { ...PARCEL, weight: 4000, pieces: 40, isEstimated: false },
    { reportLaboratory: 'Norvane', reportNumber: '21180453', statedWeight: 1010 },
  );
  const consigned = await house.people.buyer.post('/api/lots', {
    how: 'consignment in',
    party: house.consignor,
    due: '2998-05-05',
    lots: [{ kind: 'stone', weight: 1200, pieces: 1, origin: 'not tested', place: house.drawer }],
  });
  theirs = consigned.body.numbers[0];
});
afterAll(() => house.close());

async function read(text: string, lines: object[] = []): Promise<Body> {
  const body = { text, party: house.customer, lines };
  return (await house.people.dealer.post('/api/memo-lines/read', body)).body;
}

describe('the scan line says what Enter will do', () => {
  it('a lot alone is the whole of it, at its asking price', async () => {
    const { line, says } = await read(melee);
    expect(line).toMatchObject({ lot: melee, weight: 48_620, pieces: 3214, price: 42_000 });
    expect(says).toBe('48.62 of 48.62 ct in Safe A1, about 3,214 pcs, 20,420.40 USD at 420 USD/ct');
    expect(line.after).toEqual({ safe: 0, out: 48_620, returned: 0, sold: 0, missing: 0 });
  });

  it('carats of an estimated parcel bring their pieces, pieces bring their carats', async () => {
    expect((await read(`${melee} 9.06`)).line).toMatchObject({ weight: 9060, pieces: 599 });
    expect((await read(`${melee} 9,06 @960`)).line).toMatchObject({ weight: 9060, price: 96_000 });
    expect((await read(`${melee} 598p`)).line).toMatchObject({ weight: 9050, pieces: 598 });
    expect((await read(`${melee} 2.00 =700`)).line).toMatchObject({
      price: null,
      sum: 70_000,
      amount: 70_000,
    });
  });

  it('a part of a counted parcel asks how many pieces go', async () => {
    expect((await read(`${counted} 1.00`)).refusal.sentence).toBe(
      `${counted} not added. Its pieces are counted: say how many go, such as ${counted} 1.00 10p.`,
    );
    expect((await read(`${counted} 1.00 11p`)).line).toMatchObject({ weight: 1000, pieces: 11 });
  });

  it('a report number finds its stone, priced by its stated weight', async () => {
    expect((await read('21180453')).line).toMatchObject({
      lot: stone,
      weight: 1020,
      pricedWeight: 1010,
      amount: 533_280,
    });
  });

  it('what can’t be added says why, and the line stays ready', async () => {
    const sentence = async (text: string, lines?: object[]) =>
      (await read(text, lines)).refusal.sentence;
    expect(await sentence('9999')).toBe(
      '9999 not added. No lot or report of ours has that number.',
    );
    expect(await sentence(`${melee} 60`)).toBe(`${melee} not added. Only 48.62 ct is in Safe A1.`);
    expect(await sentence(`${stone} 0.50`)).toBe(
      `${stone} not added. A stone, pair or set goes whole, 1.02 ct.`,
    );
    const there = [{ lot: stone, weight: 1020, pieces: 1, price: 1 }];
    expect(await sentence(stone, there)).toBe(
      `${stone} not added. It stands on this memo already; edit its line.`,
    );
    for (const odd of ['1,234', '9.065', '0', '-1', 'NaN', '1e400', '@-5', '=x', '0p'])
      expect([odd, await sentence(`${melee} ${odd}`)]).toEqual([
        odd,
        expect.stringMatching(new RegExp(`^${melee} not added\\. .{10,}`)),
      ]);
  });

  it('goods of a consignor, not tested, say both and when they are due back', async () => {
    const { warnings } = await read(theirs);
    expect(warnings).toEqual([
      'Not tested for origin.',
      'Consigned by Consignor, due back to them 5 May 2998.',
    ]);
    const lines = [{ lot: theirs, weight: 1200, pieces: 1, price: 100_000 }];
    const preview = await house.people.dealer.post('/api/memos/preview', house.memoOf(lines));
    expect(preview.body.cautions).toEqual([
      `${theirs} is due back to Consignor on 5 May 2998, before this memo ends.`,
    ]);
    const sooner = house.memoOf(lines, { due: '2998-05-05' });
    expect((await house.people.dealer.post('/api/memos/preview', sooner)).body.cautions).toEqual(
      [],
    );
  });
});

describe('exposure while writing', () => {
  it('grows with the lines and says by how much the last is cut to fit the limit', async () => {
    const party = (
      await house.people.owner.post('/api/parties', {
        name: 'Narrow',
        isCustomer: true,
        creditLimit: 1_000_000,
      })
    ).body.number;
    const lines = [
      { lot: stone, weight: 1020, pieces: 1, price: 528_000 },
      { lot: melee, weight: 20_000, pieces: 1322, price: 42_000 },
    ];
    const { body } = await house.people.dealer.post('/api/memos/preview', {
      ...house.memoOf(lines),
      party,
    });
    expect(body).toMatchObject({
      thisMemo: 533_280 + 840_000,
      after: 1_373_280,
      overBy: 373_280,
      cutLastTo: 11_110,
      owners: ['Olga Owner'],
    });
    const [first, last] = lines;
    const cut = { ...house.memoOf([first as never, { ...last, weight: 11_110 } as never]), party };
    expect((await house.people.dealer.post('/api/memos/preview', cut)).body.overBy).toBe(0);
  });
});
