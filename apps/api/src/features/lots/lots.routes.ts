import { type Route, STAFF } from '../../http/route.js';
import { changeLot } from './change-lot.js';
import { listLots, lotsCsv, sumLots } from './list-lots.js';
import { reverse, transfer } from './move-lots.js';
import { readLot } from './read-lot.js';
import { dropSieve, listSieves, saveSieve } from './sieves.js';
import { takeIn } from './take-in.js';

/** Lots: the list and its sieve, one lot, taking in, moving, undoing. */
export const lotRoutes: Route[] = [
  { method: 'get', path: '/lots', allowed: STAFF, handle: listLots },
  { method: 'get', path: '/lots/sum', allowed: STAFF, handle: sumLots },
  { method: 'get', path: '/lots.csv', allowed: STAFF, handle: lotsCsv },
  { method: 'post', path: '/lots', allowed: ['owner', 'buyer'], handle: takeIn },
  { method: 'get', path: '/lots/:number', allowed: STAFF, handle: readLot },
  {
    method: 'patch',
    path: '/lots/:number',
    allowed: ['owner', 'dealer', 'buyer'],
    handle: changeLot,
  },
  { method: 'post', path: '/transfers', allowed: STAFF, handle: transfer },
  {
    method: 'post',
    path: '/movements/:id/reverse',
    allowed: ['owner', 'dealer', 'buyer', 'bookkeeper'],
    handle: reverse,
  },
  { method: 'get', path: '/sieves', allowed: STAFF, handle: listSieves },
  { method: 'post', path: '/sieves', allowed: STAFF, handle: saveSieve },
  { method: 'delete', path: '/sieves/:id', allowed: STAFF, handle: dropSieve },
];
