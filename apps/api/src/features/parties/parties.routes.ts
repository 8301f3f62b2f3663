import { type Route, STAFF } from '../../http/route.js';
import { addParty, changeParty, listParties, readParty } from './parties.js';

/** Customers, suppliers, consignors, brokers, laboratories and workshops. */
export const partyRoutes: Route[] = [
  { method: 'get', path: '/parties', allowed: STAFF, handle: listParties },
  { method: 'post', path: '/parties', allowed: ['owner', 'dealer', 'buyer'], handle: addParty },
  { method: 'get', path: '/parties/:number', allowed: STAFF, handle: readParty },
  {
    method: 'patch',
    path: '/parties/:number',
    allowed: ['owner', 'dealer', 'buyer'],
    handle: changeParty,
  },
];
