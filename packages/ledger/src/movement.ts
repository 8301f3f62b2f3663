import type { Legs } from './leg.js';

/** Every kind of business event the ledger knows. */
export const MOVEMENT_KINDS = [
  'opening',
  'purchase',
  'consignment in',
  'bought from consignor',
  'return to consignor',
  'return to supplier',
  'transfer',
  'memo out',
  'memo return',
  'memo void',
  'put away',
  'kept',
  'un-kept',
  'sale',
  'credit return',
  'difference opened',
  'difference answered',
  'restatement',
  'conversion',
  'recut',
  'laboratory out',
  'laboratory back',
  'workshop out',
  'workshop back',
  'charge',
  'write-down',
  'count adjustment',
  'write-off',
  'found again',
  'correction',
  'reversal',
] as const;
export type MovementKind = (typeof MOVEMENT_KINDS)[number];

/** What a conversion is called. */
export const CONVERSION_WORDS = [
  'split',
  'pick',
  'mix',
  'sort',
  'test result',
  'make',
  'break',
] as const;
export type ConversionWord = (typeof CONVERSION_WORDS)[number];

/** Legs with the kind of event they are. */
export interface Movement extends Legs {
  kind: MovementKind;
  word?: ConversionWord;
}

/** Kinds that never come back by a reversal: they are put right by a credit return or a correction. */
const NEVER_REVERSED: readonly MovementKind[] = ['sale', 'credit return', 'correction', 'reversal'];

/** Whether a movement of this kind may be reversed at all, while it is the newest where it added. */
export function canBeReversed(kind: MovementKind): boolean {
  return !NEVER_REVERSED.includes(kind);
}
