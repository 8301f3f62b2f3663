import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp, STONE } from '../support/house-over-http.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

describe('an undoing', () => {
  it('needs a reason, is the mirror, and names what came later where it can’t be', async () => {
    const [lot = ''] = await house.takeIn({});
    const { isReversible } = (await house.people.owner.get(`/api/lots/${lot}`)).body;
    const undo = (reason: string) =>
      house.people.owner.post(`/api/movements/${isReversible.movementId}/reverse`, { reason });
    expect((await undo(' ')).status).toBe(409);
    const { number } = (
      await house.people.dealer.post('/api/memos', house.memoOf([{ lot, weight: 1020, pieces: 1 }]))
    ).body;
    const refused = await undo('typed twice');
    expect(refused.body.code).toBe('reversal_of_newest');
    expect(refused.body.detail).toContain(`${lot} memo out`);
    await house.people.dealer.post(`/api/memos/${number}/void`, { reason: 'x' });
    expect((await house.people.owner.get(`/api/lots/${lot}`)).body.row.weight).toBe(STONE.weight);
  });

  it('takes goods that came in by mistake out again', async () => {
    const [lot = ''] = await house.takeIn({});
    const { isReversible } = (await house.people.owner.get(`/api/lots/${lot}`)).body;
    expect(
      (
        await house.people.owner.post(`/api/movements/${isReversible.movementId}/reverse`, {
          reason: 'typed twice',
        })
      ).status,
    ).toBe(201);
    expect((await house.people.owner.get(`/api/lots/${lot}`)).body.row).toMatchObject({
      weight: 0,
      place: 'not in the house',
    });
    expect(
      (
        await house.people.owner.post(`/api/movements/${isReversible.movementId}/reverse`, {
          reason: 'again',
        })
      ).status,
    ).toBe(409);
  });
});
