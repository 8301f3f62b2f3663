import type { Leg, Legs, LotRef, PlaceRef, Quantity } from './leg.js';

/** What goes into a conversion, from where, and what of it is lost on the way. */
export interface Source extends Quantity {
  lot: LotRef;
  from: PlaceRef;
  loss?: Quantity & {
    /** Above tolerance the loss takes its share of cost as expense. */ takesCost: boolean;
  };
}

/** What comes out; `share` allots cost: its weight, or weight times worth per carat. */
export interface Part extends Quantity {
  lot: LotRef;
  to: PlaceRef;
  share: number;
}

/**
 * One or several lots become others: split, pick, mix, sort, test result, make, break. What goes in
 * passes the conversion place whole, what comes out shares its cost by largest remainder.
 */
export function convert(sources: Source[], parts: Part[]): Legs {
  const legs: Leg[] = [];
  const pools: Legs['pools'] = [];
  const given: number[] = [];
  for (const { lot, from, weight, pieces, loss } of sources) {
    const pool = pools.push({ of: [legs.length] }) - 1;
    const [lost, lostPieces] = [loss?.weight ?? 0, loss?.pieces ?? 0];
    legs.push({ lot, place: from, weight: -weight, pieces: -pieces, cost: { how: 'carried' } });
    given.push(legs.length);
    legs.push({
      lot,
      place: { kind: 'conversion' },
      weight: weight - lost,
      pieces: pieces - lostPieces,
      cost: { how: 'allotted', pool, weight: loss?.takesCost ? weight - lost : 1 },
    });
    if (loss) {
      legs.push({
        lot,
        place: { kind: 'loss' },
        weight: lost,
        pieces: lostPieces,
        cost: loss.takesCost ? { how: 'allotted', pool, weight: lost } : { how: 'none' },
      });
    }
  }
  const shared = pools.push({ of: given }) - 1;
  for (const { lot, to, weight, pieces, share } of parts) {
    const pool = pools.push({ of: [legs.length] }) - 1;
    legs.push({
      lot,
      place: { kind: 'conversion' },
      weight: -weight,
      pieces: -pieces,
      cost: { how: 'allotted', pool: shared, weight: share },
    });
    legs.push({ lot, place: to, weight, pieces, cost: { how: 'allotted', pool, weight: 1 } });
  }
  return { legs, pools };
}
