import { randomUUID } from 'node:crypto';
import express, { type Express, type Request, type Response, Router } from 'express';
import type { DataSource } from 'typeorm';

import type { Config } from './config/config.js';
import { Refusal } from './http/errors.js';
import { admit, refuseForgery } from './http/guard.js';
import { health } from './http/health.js';
import { log } from './http/log.js';
import { assertMatrix } from './http/matrix.js';
import { problems, sendProblem } from './http/problem.js';
import type { Answer, Route } from './http/route.js';
import { securityHeaders } from './http/security-headers.js';
import { sessions } from './http/session.js';
import { webFiles } from './http/web.js';
import { routes } from './routes.js';

export interface Server {
  app: Express;
  close(): Promise<void>;
}

/** The whole app over a data source, not listening; tests build it the same way. */
export function buildServer(config: Config, db: DataSource): Server {
  assertMatrix(routes);
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'simple');
  app.set('etag', false);
  app.set('trust proxy', config.trustedProxies);
  app.use(identify, ...securityHeaders(config));
  app.use((req, res, next) => {
    if (['TRACE', 'TRACK', 'CONNECT'].includes(req.method))
      sendProblem(res, { status: 405, code: 'method', detail: 'That is not done here.' });
    else next();
  });
  const session = sessions(config);
  app.use('/api', api(db, session.handler));
  if (config.webDir) app.use(webFiles(config.webDir));
  app.use((_req, res) =>
    sendProblem(res, {
      status: 404,
      code: 'not_found',
      detail: 'There is nothing at that address.',
    }),
  );
  app.use(problems);
  return { app, close: session.close };
}

function identify(req: Request, res: Response, next: () => void): void {
  res.locals.requestId = randomUUID();
  res.setHeader('X-Request-Id', res.locals.requestId as string);
  const began = performance.now();
  res.on('finish', () =>
    log({
      level: 'info',
      requestId: res.locals.requestId,
      method: req.method,
      route: res.locals.route ?? 'file',
      person: res.locals.personId,
      status: res.statusCode,
      ms: Math.round(performance.now() - began),
    }),
  );
  next();
}

function api(db: DataSource, session: express.RequestHandler): Router {
  const router = Router();
  router.use((_req, res, next) => {
    res.setHeader('Cache-Control', 'no-store');
    next();
  });
  router.get('/health', health(db));
  router.use(express.json({ limit: '100kb', inflate: false, strict: true }), session);
  for (const route of routes) router[route.method](route.path, answering(route, db));
  router.use((_req, res) =>
    sendProblem(res, {
      status: 404,
      code: 'not_found',
      detail: 'There is nothing at that address.',
    }),
  );
  return router;
}

function answering(route: Route, db: DataSource) {
  return async (req: Request, res: Response): Promise<void> => {
    res.locals.route = route.path;
    for (const value of Object.values(req.query)) {
      if (typeof value !== 'string')
        throw new Refusal(400, 'not_readable', 'Something in the address stands twice.');
    }
    refuseForgery(req);
    const person = await admit(req, db, route.allowed);
    res.locals.personId = person.id;
    send(res, await route.handle(req, { db, person }, res));
  };
}

function send(res: Response, { status = 200, body, headers = {}, text }: Answer): void {
  for (const [name, value] of Object.entries(headers)) res.setHeader(name, value);
  res.status(status);
  if (text !== undefined) res.send(text);
  else if (body === undefined) res.end();
  else res.json(body);
}
