import type { WeighBackRequest } from '@foldwell/contracts';
import type { Quantity } from '@foldwell/ledger';

import type { findMemo } from '../memos/find-memo.js';
import type { Judged } from './judge-reading.js';

/** A line of a memo as the ledger names it. */
export type FoundLine = Awaited<ReturnType<typeof findMemo>>['lines'][number];

/** A reading of one line and what it was judged to mean. */
export interface Weighed {
  memoId: number;
  line: FoundLine;
  /** What is to come back this time, of what is out. */
  coming: Quantity;
  request: WeighBackRequest;
  judged: Judged;
}
