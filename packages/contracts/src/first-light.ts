import type { Bar } from './lots.js';
import type { DifferenceRow, MemoRow } from './memos.js';

/** The arrival page: where every carat is, what is due, what does not agree, who is late. */
export interface FirstLight {
  today: string;
  bar: Bar;
  whole: number;
  /** What is said under each part. */
  under: Record<keyof Bar | 'whole', string>;
  memos: MemoRow[];
  differences: DifferenceRow[];
  late: {
    party: string;
    partyNumber: string;
    days: number;
    memo: string;
    lastWord: string;
    value: number;
    currency: string;
  }[];
}
