import type { Allowed } from './route.js';

const STAFF = ['owner', 'dealer', 'buyer', 'bookkeeper'] as const;
const WRITERS = ['owner', 'dealer'] as const;
const EDITORS = ['owner', 'dealer', 'buyer'] as const;
const RECEIVERS = ['owner', 'dealer', 'bookkeeper'] as const;

/** Who may do what, by route, written down apart from the routes: a route absent here does not start. */
export const MATRIX: Readonly<Record<string, Allowed>> = {
  'get /first-owner': 'anyone',
  'post /first-owner': 'anyone',
  'post /sign-in': 'anyone',
  'post /sign-out': 'signed-in',
  'post /sign-out-everywhere': 'signed-in',
  'post /password': 'signed-in',
  'get /me': 'signed-in',
  'get /people': STAFF,
  'post /people': ['owner'],
  'patch /people/:id': ['owner'],
  'post /people/:id/sign-out': ['owner'],
  'get /house': STAFF,
  'patch /house': ['owner'],
  'post /rates': ['owner', 'bookkeeper'],
  'patch /number-series/:series': ['owner'],
  'get /places': STAFF,
  'post /places': ['owner'],
  'patch /places/:id': ['owner'],
  'get /parties': STAFF,
  'post /parties': EDITORS,
  'get /parties/:number': STAFF,
  'patch /parties/:number': EDITORS,
  'get /lots': STAFF,
  'get /lots/sum': STAFF,
  'get /lots.csv': STAFF,
  'post /lots': ['owner', 'buyer'],
  'get /lots/:number': STAFF,
  'patch /lots/:number': EDITORS,
  'post /transfers': STAFF,
  'post /movements/:id/reverse': STAFF,
  'get /sieves': STAFF,
  'post /sieves': STAFF,
  'delete /sieves/:id': STAFF,
  'get /pick-up': STAFF,
  'get /drafts': STAFF,
  'post /drafts': WRITERS,
  'get /drafts/:id': STAFF,
  'put /drafts/:id': WRITERS,
  'delete /drafts/:id': WRITERS,
  'post /memo-lines/read': WRITERS,
  'post /memos/preview': WRITERS,
  'get /memos': STAFF,
  'post /memos': WRITERS,
  'get /memos/:number': STAFF,
  'get /documents/:number': STAFF,
  'post /memos/:number/void': WRITERS,
  'post /memos/:number/extend': WRITERS,
  'post /memos/:number/re-price': WRITERS,
  'post /memos/:number/transfer': WRITERS,
  'post /memos/:number/keep': RECEIVERS,
  'post /memos/:number/un-keep': RECEIVERS,
  'post /memos/:number/words': STAFF,
  'get /returns': STAFF,
  'post /memos/:number/returns': RECEIVERS,
  'post /memos/:number/return-slip': RECEIVERS,
  'post /put-away': RECEIVERS,
  'get /differences': STAFF,
  'post /differences/:id/weigh-again': RECEIVERS,
  'post /differences/:id/ask': RECEIVERS,
  'post /differences/:id/answer': ['owner', 'bookkeeper'],
  'get /first-light': STAFF,
};

/** Refuses to start where routes and matrix don't say the same. */
export function assertMatrix(
  routes: readonly { method: string; path: string; allowed: Allowed }[],
): void {
  const named = new Set(routes.map(({ method, path }) => `${method} ${path}`));
  const wrong = [
    ...routes
      .filter(
        ({ method, path, allowed }) =>
          JSON.stringify(MATRIX[`${method} ${path}`]) !== JSON.stringify(allowed),
      )
      .map(({ method, path }) => `${method} ${path}`),
    ...Object.keys(MATRIX).filter((route) => !named.has(route)),
  ];
  if (wrong.length > 0) throw new Error(`Routes and matrix differ: ${wrong.join(', ')}`);
}
