import type { Book, Line, Lot, Quantity } from '../book.js';
import { stillOut } from '../book.js';
import type { Dice } from '../dice.js';
import type { Plan } from '../plan.js';

/** Something a house may do next, that can be done again on another book in the same state. */
export type Operation = (book: Book) => Plan;
/** Thinks of something to do by what lies where; null where nothing fits. */
export type Chooser = (book: Book, dice: Dice) => Operation | null;

export const OWN = ['drawer1', 'drawer2', 'show', 'person', 'return desk'];

export interface Holding {
  index: number;
  lot: Lot;
  place: string;
  has: Quantity;
}

/** One place of one lot, among those that hold weight and fit. */
export function holding(
  book: Book,
  dice: Dice,
  fits: (lot: Lot, place: string) => boolean,
): Holding | null {
  // Newer lots are thought of more often, so that a long history still meets its own goods again.
  const from = dice.isLucky(0.7) ? Math.max(0, book.lots.length - 60) : 0;
  const all = book.lots
    .slice(from)
    .flatMap((lot, index): Holding[] =>
      [...lot.places].flatMap(([place, has]) =>
        has.weight > 0 && fits(lot, place) ? [{ index: index + from, lot, place, has }] : [],
      ),
    );
  return dice.one(all) ?? null;
}

export const inOwnHands = (_lot: Lot, place: string) => OWN.includes(place);

/** A part of what lies there, pieces following the weight; a stone, pair or set is whole. */
export function partOf(
  { weight, pieces }: { weight: number; pieces: number },
  lot: Lot,
  dice: Dice,
): { weight: number; pieces: number } {
  const all = { weight, pieces };
  if (lot.fixedPieces !== null || weight < 20 || dice.isLucky(0.25)) return all;
  const part = 10 * dice.between(1, Math.floor(weight / 10) - 1);
  if (lot.isEstimated && pieces < 2) return { weight: part, pieces: 0 };
  const least = Math.max(1, pieces - (weight - part));
  const most = Math.min(part, pieces - 1);
  if (least > most) return all;
  const follows = Math.round((pieces * part) / weight);
  return { weight: part, pieces: Math.min(most, Math.max(least, follows)) };
}

/** A line that still has goods out. */
export function openLine(
  book: Book,
  dice: Dice,
  fits: (line: Line) => boolean = () => true,
): { memo: number; at: number; line: Line } | null {
  const recent = dice.isLucky(0.8) ? Math.max(0, book.memos.length - 30) : 0;
  const lines = book.memos
    .slice(recent)
    .flatMap(({ lines: all }, memo) =>
      all.flatMap((line, at) =>
        stillOut(line).weight > 0 && fits(line) ? [{ memo: memo + recent, at, line }] : [],
      ),
    );
  return dice.one(lines) ?? null;
}

export function lotOf(book: Book, index: number): Lot {
  const lot = book.lots[index];
  if (!lot) throw new Error(`no lot ${index}`);
  return lot;
}

export function lineOf(book: Book, { memo, at }: { memo: number; at: number }): Line {
  const line = book.memos[memo]?.lines[at];
  if (!line) throw new Error(`no line ${at} of memo ${memo}`);
  return line;
}
