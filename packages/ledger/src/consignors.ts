import type { Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';
import { allotted, CARRIED, given, less, NO_COST } from './moves.js';

/** Consigned goods that become ours: his lot, ours (split off, the same number with a letter). */
export interface Bought extends Quantity {
  theirs: LotRef;
  ours: LotRef;
  at: PlaceRef;
  /** Where ours is after it: the same place, `sold` or `loss`. */
  to: PlaceRef;
  /** The price agreed with the consignor, in minor units of the base currency. */
  price: number;
  /** What hangs on his lot leaving its place, on it entering the conversion, on ours arriving. */
  fromMark?: Mark | undefined;
  becameMark?: Mark | undefined;
  toMark?: Mark | undefined;
}

/**
 * A consignor's goods bought where they lie: his lot passes the conversion place without cost and
 * ours comes out of it at the agreed price.
 */
export function buyFromConsignor(bought: Bought): Legs {
  const { theirs, ours, at, to, price, weight, pieces } = bought;
  const goods = { weight, pieces };
  const conversion: PlaceRef = { kind: 'conversion' };
  return {
    legs: [
      { lot: theirs, place: at, ...less(goods), cost: CARRIED, ...bought.fromMark },
      { lot: theirs, place: conversion, ...goods, cost: NO_COST, ...bought.becameMark },
      { lot: ours, place: conversion, ...less(goods), cost: NO_COST },
      { lot: ours, place: { kind: 'supplier' }, weight: 0, pieces: 0, cost: given(-price || 0) },
      { lot: ours, place: to, ...goods, cost: allotted(0), ...bought.toMark },
    ],
    pools: [{ of: [3] }],
  };
}

/**
 * A consigned lot sold: bought and sold in one movement. What passes through our own place on the
 * way is left out, for it comes to nothing there.
 */
export function sellConsigned(sold: Omit<Bought, 'to' | 'toMark'>): Legs {
  return buyFromConsignor({ ...sold, to: { kind: 'sold' } });
}

/** Consigned goods lost: bought at the agreed price, then lost at it. */
export function loseConsigned(lost: Omit<Bought, 'to' | 'toMark'>): Legs {
  return buyFromConsignor({ ...lost, to: { kind: 'loss' } });
}
