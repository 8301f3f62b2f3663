import { Book } from './book.js';
import { Dice } from './dice.js';
import { sizeOf, takeBack, whyRefused } from './judge.js';
import type { LedgerHouse } from './ledger-house.js';
import { accept, foundAgain, staysWithCustomer, writeOffMissing } from './operations/answers.js';
import { adjustCount, charge, correctCost, writeDown, writeOff } from './operations/costing.js';
import type { Chooser, Operation } from './operations/goods.js';
import {
  bringBack,
  bringBackOff,
  bringBackShort,
  keep,
  sendOut,
  unKeep,
  voidMemo,
} from './operations/memos.js';
import { backFromWork, putAway, sendToWork, tooMuch, transfer } from './operations/moving.js';
import { credit, sell } from './operations/selling.js';
import { buyConsigned, consignIn, giveBack, takeIn } from './operations/taking-in.js';
import { undo } from './operations/undoing.js';
import { divide, mixOrBreak, recut } from './operations/working.js';
import type { Plan } from './plan.js';
import { RULES, type Rules } from './rules.js';

/** What a house does, and how often. */
const CHOICES: [Chooser, number][] = [
  [takeIn, 8],
  [consignIn, 4],
  [giveBack, 2],
  [buyConsigned, 2],
  [transfer, 6],
  [putAway, 5],
  [tooMuch, 3],
  [sendOut, 12],
  [bringBack, 6],
  [bringBackOff, 5],
  [bringBackShort, 5],
  [keep, 6],
  [unKeep, 2],
  [voidMemo, 2],
  [sell, 4],
  [credit, 3],
  [foundAgain, 2],
  [staysWithCustomer, 2],
  [writeOffMissing, 2],
  [accept, 3],
  [divide, 5],
  [mixOrBreak, 4],
  [sendToWork, 4],
  [backFromWork, 3],
  [recut, 3],
  [charge, 3],
  [writeDown, 2],
  [writeOff, 2],
  [adjustCount, 3],
  [correctCost, 2],
  [undo, 6],
];
const WHEEL = CHOICES.flatMap(([chooser, often]) => Array<Chooser>(often).fill(chooser));

/** What happened in a history: what was done, to be done again elsewhere, and how often what was refused. */
export interface History {
  book: Book;
  done: Operation[];
  kinds: Map<string, number>;
  refused: Map<string, number>;
}

/**
 * A random history of so many acts, each judged by the model and by the database; throws where they
 * don't agree on whether it may be. `every` is called after each five hundred.
 */
export async function liveThrough(
  house: LedgerHouse,
  { seed, acts }: { seed: number; acts: number },
  every: (book: Book) => Promise<void> = () => Promise.resolve(),
): Promise<History> {
  const dice = new Dice(seed);
  const book = new Book(RULES);
  const history: History = { book, done: [], kinds: new Map(), refused: new Map() };
  for (let act = 1; act <= acts; ) {
    const operation = dice.one(WHEEL)?.(book, dice);
    if (!operation) continue;
    await step(house, history, operation, `seed ${seed}, act ${act}`);
    if (act % 500 === 0) await every(book);
    act += 1;
  }
  await every(book);
  return history;
}

async function step(
  house: LedgerHouse,
  { book, done, kinds, refused }: History,
  operation: Operation,
  where: string,
): Promise<void> {
  const before = sizeOf(book);
  const plan = operation(book);
  const why = whyRefused(book, plan);
  const said = await house.write(plan).catch((error: Error) => {
    throw new Error(`${where}, ${describe(plan)}: ${error.message}`, { cause: error });
  });
  if ((why === null) !== (said === '')) {
    const [model, database] = [why ?? 'may be', said || 'wrote it'];
    throw new Error(
      `${where}, ${describe(plan)}: the model says ${model}, the database ${database}`,
    );
  }
  if (why !== null) {
    takeBack(book, plan, before);
    refused.set(said, (refused.get(said) ?? 0) + 1);
    return;
  }
  book.movements.push(plan);
  done.push(operation);
  kinds.set(plan.kind, (kinds.get(plan.kind) ?? 0) + 1);
}

const describe = ({ kind, legs, more }: Plan) =>
  `${kind} ${JSON.stringify({ ...more })} ${legs
    .map((leg) => `${leg.lot.key}@${leg.place} ${leg.weight}/${leg.pieces}/${leg.cost}`)
    .join('; ')}`;

/** Does again what was done, on a new book under other rules. */
export function relive(done: Operation[], rules: Rules): Book {
  const book = new Book(rules);
  for (const operation of done) book.movements.push(operation(book));
  return book;
}
