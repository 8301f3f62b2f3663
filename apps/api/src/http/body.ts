import { createHash } from 'node:crypto';
import { plainToInstance } from 'class-transformer';
import { validate, type ValidationError } from 'class-validator';
import type { FieldProblem } from '@foldwell/contracts';
import type { Request } from 'express';

import { Refusal, ValidationFailed } from './errors.js';

const DEEPEST = 32;

/** The body as the request class, or one sentence for each field that isn't right. */
export async function readBody<T extends object>(req: Request, type: new () => T): Promise<T> {
  const body: unknown = req.body;
  if (typeof body !== 'object' || body === null || Array.isArray(body) || depth(body) > DEEPEST) {
    throw new ValidationFailed([{ field: '', message: 'The request needs a JSON object.' }]);
  }
  const request = plainToInstance(type, body);
  const errors = await validate(request, {
    whitelist: true,
    forbidNonWhitelisted: true,
    forbidUnknownValues: true,
  });
  if (errors.length > 0) throw new ValidationFailed(errors.flatMap((error) => problemsOf(error)));
  return request;
}

function problemsOf(error: ValidationError, path = ''): FieldProblem[] {
  const field = path ? `${path}.${error.property}` : error.property;
  const own = Object.entries(error.constraints ?? {}).map(([rule, message]) => ({
    field,
    message:
      rule === 'whitelistValidation' ? `${error.property} is not a field of this form.` : message,
  }));
  return [...own, ...(error.children ?? []).flatMap((child) => problemsOf(child, field))];
}

function depth(value: unknown): number {
  // By hand, not by recursion: a body of brackets alone would overflow the stack.
  let deepest = 0;
  const waiting: [unknown, number][] = [[value, 1]];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const [one, level] = next;
    deepest = Math.max(deepest, level);
    if (deepest > DEEPEST) return deepest;
    if (typeof one === 'object' && one !== null)
      for (const part of Object.values(one)) waiting.push([part, level + 1]);
  }
  return deepest;
}

/** The client's key for a booking: sent again with the same contents it gives the same answer. */
export function requireKey(req: Request): string {
  const key = req.get('idempotency-key') ?? '';
  if (!/^[\w-]{16,255}$/.test(key)) {
    throw new Refusal(400, 'key_missing', 'The request lacks its own key. Load the page again.');
  }
  return key;
}

/** SHA-256 of what is asked, the same however its keys are ordered. */
export function bodyHash(req: Request): string {
  return createHash('sha256')
    .update(`${req.method} ${req.path}\n${canonical(req.body)}`)
    .digest('hex');
}

function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value) ?? 'null';
  const entries = Object.entries(value)
    .filter(([, one]) => one !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${entries.map(([key, one]) => `${JSON.stringify(key)}:${canonical(one)}`).join(',')}}`;
}

/** The version the page was made from (`If-Match: "v3"`); missing is 428. */
export function requireVersion(req: Request): number {
  const match = /^"v(\d{1,9})"$/.exec(req.get('if-match') ?? '');
  if (!match)
    throw new Refusal(
      428,
      'version_missing',
      'The request does not say which version it changes. Load the page again.',
    );
  return Number(match[1]);
}

/** What a stale page gets: both versions, so that nothing typed is lost. */
export function changedMeanwhile(current: unknown): Refusal {
  return new Refusal(
    412,
    'changed_meanwhile',
    'Somebody changed it meanwhile. Both versions are shown; nothing of yours is lost.',
    { current },
  );
}

/** One plain text of the address; empty where it isn't there. */
export function queryText(req: Request, name: string): string {
  const value = req.query[name];
  return typeof value === 'string' ? value.trim().slice(0, 200) : '';
}
