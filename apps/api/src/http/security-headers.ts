import { randomBytes } from 'node:crypto';
import type { RequestHandler } from 'express';
import helmet from 'helmet';

import type { Config } from '../config/config.js';

/** Headers on every answer, errors and files too; the nonce is for index.html of this answer alone. */
export function securityHeaders(config: Config): RequestHandler[] {
  return [
    (_req, res, next) => {
      res.locals.nonce = randomBytes(16).toString('base64');
      res.setHeader('Permissions-Policy', 'camera=(), microphone=(), geolocation=(), payment=()');
      next();
    },
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'none'"],
          scriptSrc: [
            "'self'",
            (_req, res) =>
              `'nonce-${(res as { locals?: { nonce?: string } }).locals?.nonce ?? ''}'`,
          ],
          styleSrc: [
            "'self'",
            (_req, res) =>
              `'nonce-${(res as { locals?: { nonce?: string } }).locals?.nonce ?? ''}'`,
          ],
          fontSrc: ["'self'"],
          imgSrc: ["'self'", 'data:'],
          connectSrc: ["'self'"],
          manifestSrc: ["'self'"],
          formAction: ["'self'"],
          baseUri: ["'none'"],
          objectSrc: ["'none'"],
          frameAncestors: ["'none'"],
        },
      },
      strictTransportSecurity: config.isCookieSecure
        ? { maxAge: 31_536_000, includeSubDomains: true }
        : false,
      referrerPolicy: { policy: 'no-referrer' },
      crossOriginOpenerPolicy: { policy: 'same-origin' },
      crossOriginResourcePolicy: { policy: 'same-origin' },
    }),
  ];
}
