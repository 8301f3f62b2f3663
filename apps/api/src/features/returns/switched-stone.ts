import type { Context } from '../../http/route.js';
import type { Act, NewDifference } from '../ledger/act.js';
import type { Weighed } from './weighed.js';

/** Ours stays on the memo; what came is a new lot of that party's, without cost, in quarantine. */
export async function switchAct(
  { db }: Context,
  { memoId, line, request }: Weighed,
  difference: NewDifference,
): Promise<Act> {
  const [party] = await db.query<{ id: string; name: string }[]>(
    'SELECT y.id, y.name FROM party y JOIN memo m ON m.party_id = y.id WHERE m.id = $1',
    [memoId],
  );
  const came = { new: 'came' };
  const quantity = { weight: request.weight, pieces: 1 };
  return {
    kind: 'consignment in',
    partyId: party?.id,
    paper: `came for ${line.lot}`,
    newPlaces: [
      { ref: 'theirs', kind: 'memo in', name: `Came for ${line.lot}`, partyId: party?.id ?? '' },
    ],
    newLots: [
      {
        ref: 'came',
        kind: 'stone',
        fixed_pieces: 1,
        origin: 'not tested',
        owner_party_id: party?.id,
        source_party_id: party?.id,
        particulars: {
          comments: `Came back for ${line.lot}; suspected, not proven.`,
          ...(request.reportRead && { inscription: request.reportRead }),
        },
      },
    ],
    legs: [
      {
        lot: came,
        place: { new: 'theirs' },
        weight: -quantity.weight,
        pieces: -1,
        cost: { how: 'none' },
      },
      { lot: came, place: { kind: 'quarantine' }, ...quantity, cost: { how: 'none' } },
    ],
    pools: [],
    newDifferences: [{ ...difference, cameLot: came, foundPieces: 1 }],
    weighings: [
      {
        lot: came,
        purpose: 'return',
        weight: request.weight,
        pieces: 1,
        reportRead: request.reportRead,
        difference: { new: 'd' },
      },
    ],
  };
}
