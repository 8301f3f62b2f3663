import { type Route, STAFF } from '../../http/route.js';
import { extendMemo, handOverMemo, rePriceMemo, voidMemo, writeWords } from './amend-memo.js';
import { bookMemo } from './book-memo.js';
import { changeDraft, dropDraft, keepDraft, listDrafts, readDraft } from './drafts.js';
import { keepLines, unKeepLines } from './keep-lines.js';
import { previewMemo } from './preview-memo.js';
import { readLine } from './read-line.js';
import { listMemos, readDocument, readMemo } from './read-memo.js';

const WRITERS = ['owner', 'dealer'] as const;

/** Memos: written, booked, amended by appended papers, kept from. */
export const memoRoutes: Route[] = [
  { method: 'get', path: '/drafts', allowed: STAFF, handle: listDrafts },
  { method: 'post', path: '/drafts', allowed: WRITERS, handle: keepDraft },
  { method: 'get', path: '/drafts/:id', allowed: STAFF, handle: readDraft },
  { method: 'put', path: '/drafts/:id', allowed: WRITERS, handle: changeDraft },
  { method: 'delete', path: '/drafts/:id', allowed: WRITERS, handle: dropDraft },
  { method: 'post', path: '/memo-lines/read', allowed: WRITERS, handle: readLine },
  { method: 'post', path: '/memos/preview', allowed: WRITERS, handle: previewMemo },
  { method: 'get', path: '/memos', allowed: STAFF, handle: listMemos },
  { method: 'post', path: '/memos', allowed: WRITERS, handle: bookMemo },
  { method: 'get', path: '/memos/:number', allowed: STAFF, handle: readMemo },
  { method: 'get', path: '/documents/:number', allowed: STAFF, handle: readDocument },
  { method: 'post', path: '/memos/:number/void', allowed: WRITERS, handle: voidMemo },
  { method: 'post', path: '/memos/:number/extend', allowed: WRITERS, handle: extendMemo },
  { method: 'post', path: '/memos/:number/re-price', allowed: WRITERS, handle: rePriceMemo },
  { method: 'post', path: '/memos/:number/transfer', allowed: WRITERS, handle: handOverMemo },
  {
    method: 'post',
    path: '/memos/:number/keep',
    allowed: ['owner', 'dealer', 'bookkeeper'],
    handle: keepLines,
  },
  {
    method: 'post',
    path: '/memos/:number/un-keep',
    allowed: ['owner', 'dealer', 'bookkeeper'],
    handle: unKeepLines,
  },
  { method: 'post', path: '/memos/:number/words', allowed: STAFF, handle: writeWords },
];
