import { firstLightRoutes } from './features/first-light/first-light.routes.js';
import { houseRoutes } from './features/house/house.routes.js';
import { lotRoutes } from './features/lots/lots.routes.js';
import { memoRoutes } from './features/memos/memos.routes.js';
import { partyRoutes } from './features/parties/parties.routes.js';
import { peopleRoutes } from './features/people/people.routes.js';
import { pickUpRoutes } from './features/pick-up/pick-up.js';
import { placeRoutes } from './features/places/places.routes.js';
import { returnRoutes } from './features/returns/returns.routes.js';
import type { Route } from './http/route.js';

/** Every route of the API; the matrix of routes and roles is compared with this list. */
export const routes: Route[] = [
  ...peopleRoutes,
  ...houseRoutes,
  ...placeRoutes,
  ...partyRoutes,
  ...lotRoutes,
  ...pickUpRoutes,
  ...memoRoutes,
  ...returnRoutes,
  ...firstLightRoutes,
];
