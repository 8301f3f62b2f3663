import { stillOut } from '../book.js';
import { Plan } from '../plan.js';
import { NONE } from '../plan.js';
import {
  type Chooser,
  type Holding,
  holding,
  inOwnHands,
  lineOf,
  lotOf,
  openLine,
  partOf,
} from './goods.js';

const TOLERANCE = 20;

/** One to three lots out on a new memo. */
export const sendOut: Chooser = (book, dice) => {
  const found = new Map<number, Holding>();
  for (let tries = dice.between(1, 3); tries > 0; tries -= 1) {
    const one = holding(book, dice, inOwnHands);
    if (one) found.set(one.index, one);
  }
  if (found.size === 0) return null;
  const sent = [...found.values()].map(({ index, lot, place, has }) => ({
    index,
    place,
    goods: partOf(has, lot, dice),
  }));
  return (now) => {
    const plan = new Plan(now, 'memo out');
    const memo = { key: `${now.memos.length}`, lines: [], cameFrom: sent.map((one) => one.place) };
    now.memos.push(memo);
    plan.newMemo = memo;
    for (const { index, place, goods } of sent) {
      const lot = lotOf(now, index);
      const line = now.addLine(memo, lot);
      const to = `memo:${memo.key}`;
      plan.move({ lot, from: place, to, goods, toMark: { line, flow: 'sent' } });
    }
    return plan;
  };
};

/** A line back at the desk as it was expected. */
export const bringBack: Chooser = (book, dice) => {
  const found = openLine(book, dice);
  if (!found) return null;
  const goods = partOf(stillOut(found.line), found.line.lot, dice);
  const to = dice.isLucky(0.85) ? 'return desk' : 'quarantine';
  return (now) => {
    const line = lineOf(now, found);
    const plan = new Plan(now, 'memo return', { memo: line.memo });
    const [fromMark, toMark] = [
      { line, flow: 'out' } as const,
      { line, flow: 'returned' } as const,
    ];
    plan.move({ lot: line.lot, from: `memo:${line.memo}`, to, goods, fromMark, toMark });
    return plan;
  };
};

/** A parcel back a point or two over or light: inside tolerance it is restated, cost stays. */
export const bringBackOff: Chooser = (book, dice) => {
  const found = openLine(book, dice, ({ lot }) => lot.fixedPieces === null);
  if (!found) return null;
  const expected = partOf(stillOut(found.line), found.line.lot, dice);
  const short = 10 * (dice.one([-2, -1, 1, 2]) ?? 1);
  if (Math.abs(found.line.cameBackOff + short) > TOLERANCE || expected.weight <= short) return null;
  return (now) => {
    const line = lineOf(now, found);
    const { lot } = line;
    const plan = new Plan(now, 'memo return', { memo: line.memo });
    const left = plan.take(lot, `memo:${line.memo}`, expected, { line, flow: 'out' });
    const all = -plan.costOf(left) || 0;
    const share = now.rules.share(all, Math.abs(short), expected.weight);
    const lost = Math.sign(short) * now.rules.restated(share) || 0;
    const back = { weight: expected.weight - short, pieces: expected.pieces };
    const returned = { line, flow: 'returned' } as const;
    plan.leg({ lot, place: 'return desk', ...back, cost: all - lost, ...returned }, plan.all(left));
    const restated = { line, flow: 'restated' } as const;
    plan.leg({ lot, place: 'loss', weight: short, pieces: 0, cost: lost, ...restated }, NONE);
    line.cameBackOff += short;
    return plan;
  };
};

/** A parcel back light beyond tolerance, or a stone not found: the rest lies in missing. */
export const bringBackShort: Chooser = (book, dice) => {
  const found = openLine(book, dice);
  if (!found) return null;
  const out = stillOut(found.line);
  const isWhole = found.line.lot.fixedPieces !== null || out.weight < 60;
  const light = isWhole ? out.weight : 10 * dice.between(3, Math.min(40, out.weight / 20));
  const few = found.line.lot.isEstimated ? Math.round((out.pieces * light) / out.weight) : 0;
  const short = { weight: light, pieces: isWhole ? out.pieces : few };
  const back = { weight: out.weight - light, pieces: out.pieces - short.pieces };
  return (now) => {
    const line = lineOf(now, found);
    const { lot } = line;
    const from = `memo:${line.memo}`;
    const plan = new Plan(now, 'memo return', { memo: line.memo });
    const fromMark = { line, flow: 'out' } as const;
    if (back.weight > 0) {
      const toMark = { line, flow: 'returned' } as const;
      plan.move({ lot, from, to: 'return desk', goods: back, fromMark, toMark });
    }
    const difference = plan.openDifference(lot, line);
    const toMark = { line, flow: 'missing', difference } as const;
    plan.move({ lot, from, to: 'missing', goods: short, fromMark, toMark });
    return plan;
  };
};

/** The customer keeps a line, whole or in part. */
export const keep: Chooser = (book, dice) => {
  const found = openLine(book, dice);
  if (!found) return null;
  const goods = partOf(stillOut(found.line), found.line.lot, dice);
  return (now) => {
    const line = lineOf(now, found);
    const plan = new Plan(now, 'kept', { memo: line.memo });
    const [from, to] = [`memo:${line.memo}`, `kept:${line.memo}`];
    const [fromMark, toMark] = [{ line, flow: 'out' } as const, { line, flow: 'kept' } as const];
    plan.move({ lot: line.lot, from, to, goods, fromMark, toMark });
    plan.keeps.push({ line, ...goods });
    return plan;
  };
};

/** What was kept is on memo again. */
export const unKeep: Chooser = (book, dice) => {
  const found = holding(book, dice, (_lot, place) => place.startsWith('kept:'));
  if (!found) return null;
  const goods = partOf(found.has, found.lot, dice);
  const memo = Number(found.place.slice(5));
  const at = book.memos[memo]?.lines.findIndex(({ lot }) => lot === found.lot) ?? -1;
  if (at < 0) return null;
  return (now) => {
    const line = lineOf(now, { memo, at });
    const plan = new Plan(now, 'un-kept', { memo: line.memo });
    const [from, to] = [`kept:${line.memo}`, `memo:${line.memo}`];
    const [fromMark, toMark] = [{ line, flow: 'kept' } as const, { line, flow: 'out' } as const];
    plan.move({ lot: line.lot, from, to, goods, fromMark, toMark });
    plan.keeps.push({ line, weight: -goods.weight, pieces: -goods.pieces });
    return plan;
  };
};

/** A memo booked to the wrong party: every line back to where it came from. */
export const voidMemo: Chooser = (book, dice) => {
  const found = openLine(book, dice);
  const memo = book.memos[found?.memo ?? -1];
  if (!found || !memo) return null;
  const isUntouched = memo.lines.every(
    (line) => stillOut(line).weight === line.flows.sent.weight && line.flows.sent.weight > 0,
  );
  if (!isUntouched) return null;
  return (now) => {
    const { key, lines, cameFrom } = now.memos[found.memo] ?? { key: '', lines: [], cameFrom: [] };
    const plan = new Plan(now, 'memo void', { memo: key, reason: 'wrong party' });
    for (const [at, line] of lines.entries()) {
      const [from, to] = [`memo:${key}`, cameFrom[at] ?? 'drawer1'];
      const fromMark = { line, flow: 'returned' } as const;
      plan.move({ lot: line.lot, from, to, goods: stillOut(line), fromMark });
    }
    return plan;
  };
};
