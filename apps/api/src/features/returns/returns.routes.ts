import { type Route, STAFF } from '../../http/route.js';
import { answer } from './answer.js';
import { askCustomer, closeReturn, listDifferences, listReturns, putAway } from './returns.js';
import { weighAgain } from './weigh-again.js';
import { weighBack } from './weigh-back.js';

const RECEIVERS = ['owner', 'dealer', 'bookkeeper'] as const;

/** The return desk and the answers to differences. */
export const returnRoutes: Route[] = [
  { method: 'get', path: '/returns', allowed: STAFF, handle: listReturns },
  { method: 'post', path: '/memos/:number/returns', allowed: RECEIVERS, handle: weighBack },
  { method: 'post', path: '/memos/:number/return-slip', allowed: RECEIVERS, handle: closeReturn },
  { method: 'post', path: '/put-away', allowed: RECEIVERS, handle: putAway },
  { method: 'get', path: '/differences', allowed: STAFF, handle: listDifferences },
  { method: 'post', path: '/differences/:id/weigh-again', allowed: RECEIVERS, handle: weighAgain },
  { method: 'post', path: '/differences/:id/ask', allowed: RECEIVERS, handle: askCustomer },
  {
    method: 'post',
    path: '/differences/:id/answer',
    allowed: ['owner', 'bookkeeper'],
    handle: answer,
  },
];
