import { charge } from './costs.js';
import type { Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import { move, together } from './moves.js';

/** A lot and what of it goes to a laboratory or workshop, or comes back. */
export interface Errand extends Quantity {
  lot: LotRef;
  from: PlaceRef;
  to: PlaceRef;
}

/** Goods to a laboratory or workshop. */
export function sendToWork(errand: Errand): Legs {
  return move(errand);
}

/** Goods back from a laboratory or workshop, its fee (minor units) into their cost. */
export function backFromWork(errand: Errand, fee = 0): Legs {
  const back = move(errand);
  return fee === 0 ? back : together(back, charge(errand.lot, errand.to, fee));
}
