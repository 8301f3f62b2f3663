import { timingSafeEqual } from 'node:crypto';
import type { Request } from 'express';
import type { DataSource } from 'typeorm';

import { maySeeCost, Person } from '../features/people/person.entity.js';
import { Refusal } from './errors.js';
import type { Allowed, Asker } from './route.js';
import { ABSOLUTE_MS } from './session.js';

const SIGNED_OUT: Asker = { id: '0', name: '', roles: [], seesCost: false };

/** Routes that a person with a first password may reach before changing it. */
const BEFORE_CHANGE = new Set(['/me', '/password', '/sign-out']);

/** Who asks, read from the database at each request, so that a change of role or a disabling acts at once. */
export async function askerOf(req: Request, db: DataSource): Promise<Asker | null> {
  const { personId, startedAt } = req.session ?? {};
  if (!personId || !startedAt || Date.now() - startedAt > ABSOLUTE_MS) return null;
  const person = await db.getRepository(Person).findOneBy({ id: personId });
  if (!person || person.disabledAt) return null;
  if (person.mustChangePassword && !BEFORE_CHANGE.has(req.path)) {
    throw new Refusal(
      403,
      'must_change_password',
      'Choose your own password first; this one was given to you.',
    );
  }
  return { id: person.id, name: person.name, roles: person.roles, seesCost: maySeeCost(person) };
}

/** Lets the request pass, or says what is missing: a sign-in, or a role. */
export async function admit(req: Request, db: DataSource, allowed: Allowed): Promise<Asker> {
  const asker = await askerOf(req, db);
  if (allowed === 'anyone') return asker ?? SIGNED_OUT;
  if (!asker) throw new Refusal(401, 'signed_out', 'Sign in first. What you typed is kept here.');
  if (allowed !== 'signed-in' && !asker.roles.some((role) => allowed.includes(role))) {
    throw new Refusal(403, 'not_yours', `That is for ${allowed.join(', ')}. Ask an owner.`, {
      allowed,
    });
  }
  return asker;
}

/** Refuses what another site could have sent: token, origin, fetch site and content type. */
export function refuseForgery(req: Request): void {
  if (['GET', 'HEAD', 'OPTIONS'].includes(req.method)) return;
  const site = req.get('sec-fetch-site');
  const origin = req.get('origin');
  if (
    (site && site !== 'same-origin' && site !== 'none') ||
    (origin && new URL(origin).host !== req.get('host'))
  ) {
    throw new Refusal(403, 'other_site', 'The request came from another site.');
  }
  if (Number(req.get('content-length') ?? 0) > 0 && !req.is('application/json')) {
    throw new Refusal(415, 'not_json', 'Only plain JSON is read here.');
  }
  // Signed out there is no session to forge; the origin check above stands for signing in.
  if (!req.session?.personId) return;
  const [given, kept] = [
    Buffer.from(req.get('x-csrf-token') ?? ''),
    Buffer.from(req.session.csrf ?? ''),
  ];
  if (given.length !== kept.length || !timingSafeEqual(given, kept)) {
    throw new Refusal(
      403,
      'token_missing',
      'This page is older than your sign-in. Load it again; what you typed is kept.',
    );
  }
}
