import { exactInteger } from '@foldwell/quantities';

import type { Leg, Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';
import { allotted, CARRIED, less, NO_COST } from './moves.js';
import type { ConversionWord, Movement } from './movement.js';

/** What goes into a conversion, from where, and what of it is lost on the way. */
export interface Source extends Quantity {
  lot: LotRef;
  from: PlaceRef;
  loss?: Loss;
  /** Where it lies on a memo: its line, with the flow `converted`. */
  mark?: Mark;
}

/** Lost in sorting; above tolerance the loss takes its share of cost as expense. */
export interface Loss extends Quantity {
  takesCost: boolean;
}

/** What comes out; `share` allots cost: its weight, or `worthShare`. */
export interface Part extends Quantity {
  lot: LotRef;
  to: PlaceRef;
  share: number;
  /** Where it stays on a memo: its new line, with the flow `sent`. */
  mark?: Mark;
}

/** What a part weighs times what it is thought to fetch per carat, to allot cost by relative value. */
export function worthShare(weight: number, worthPerCarat: number): number {
  return exactInteger(weight * worthPerCarat, 'worth of a part');
}

/** How many lots go into and come out of each conversion. */
const SHAPES: Record<ConversionWord, { sources: 'one' | 'many'; parts: 'one' | 'many' }> = {
  split: { sources: 'one', parts: 'many' },
  pick: { sources: 'one', parts: 'many' },
  mix: { sources: 'many', parts: 'one' },
  sort: { sources: 'one', parts: 'many' },
  'test result': { sources: 'one', parts: 'many' },
  make: { sources: 'many', parts: 'one' },
  break: { sources: 'one', parts: 'many' },
};

/**
 * One or several lots become others. Throws a RangeError where the parts and the losses don't make
 * the whole, or the word doesn't fit: callers have judged what a person typed before.
 */
export function conversion(word: ConversionWord, sources: Source[], parts: Part[]): Movement {
  const shape = SHAPES[word];
  if (shape.sources === 'one' && sources.length !== 1)
    throw new RangeError(`a ${word} has one lot`);
  if (shape.parts === 'one' && parts.length !== 1) throw new RangeError(`a ${word} makes one lot`);
  return { kind: 'conversion', word, ...convert(sources, parts) };
}

/**
 * What goes in passes the conversion place whole, what comes out shares its cost by largest
 * remainder (by weight where no share says anything).
 */
export function convert(sources: Source[], parts: Part[]): Legs {
  assertWhole(sources, parts, 'weight');
  assertWhole(sources, parts, 'pieces');
  const into: Legs = { legs: [], pools: [] };
  for (const source of sources) goIn(source, into);
  const passed = into.legs.flatMap(({ place }, at) => (isConversion(place) ? [at] : []));
  const shared = into.pools.push({ of: passed }) - 1;
  const isSaid = parts.some(({ share }) => share > 0);
  for (const part of parts) {
    comeOut(part, isSaid ? allotted(shared, part.share) : allotted(shared, part.weight), into);
  }
  return into;
}

const isConversion = (place: PlaceRef) => 'kind' in place && place.kind === 'conversion';

function goIn({ lot, from, weight, pieces, loss, mark }: Source, into: Legs): void {
  const lost: Loss = loss ?? { weight: 0, pieces: 0, takesCost: false };
  const passes = { weight: weight - lost.weight, pieces: pieces - lost.pieces };
  const pool = into.pools.push({ of: [into.legs.length] }) - 1;
  into.legs.push(
    { lot, place: from, ...less({ weight, pieces }), cost: CARRIED, ...mark },
    { lot, place: { kind: 'conversion' }, ...passes, cost: allotted(pool, passes.weight) },
  );
  if (loss)
    into.legs.push(lossLeg(lot, loss, loss.takesCost ? allotted(pool, loss.weight) : NO_COST));
}

function lossLeg(lot: LotRef, { weight, pieces }: Loss, cost: Leg['cost']): Leg {
  return { lot, place: { kind: 'loss' }, weight, pieces, cost };
}

function comeOut({ lot, to, weight, pieces, mark }: Part, cost: Leg['cost'], into: Legs): void {
  const pool = into.pools.push({ of: [into.legs.length] }) - 1;
  const goods = { weight, pieces };
  into.legs.push(
    { lot, place: { kind: 'conversion' }, ...less(goods), cost },
    { lot, place: to, ...goods, cost: allotted(pool), ...mark },
  );
}

function assertWhole(sources: Source[], parts: Part[], measure: keyof Quantity): void {
  const whole = sources.reduce((sum, one) => sum + one[measure] - (one.loss?.[measure] ?? 0), 0);
  const made = parts.reduce((sum, part) => sum + part[measure], 0);
  if (whole !== made) throw new RangeError(`the parts make ${made} of ${whole} in ${measure}`);
}
