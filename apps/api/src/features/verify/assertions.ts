import type { Assertion } from './assertion.js';
import { OF_GUARDS } from './guards-now.js';
import { OF_LEDGER } from './ledger-assertions.js';
import { OF_MEMOS } from './memo-assertions.js';
import { OF_PAPERS } from './paper-assertions.js';

/** All that verify proves, in the order it tells it. */
export const ASSERTIONS: Assertion[] = [...OF_LEDGER, ...OF_MEMOS, ...OF_PAPERS, OF_GUARDS];
