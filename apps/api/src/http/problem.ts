import type { ProblemBody } from '@foldwell/contracts';
import type { ErrorRequestHandler, Response } from 'express';
import { QueryFailedError } from 'typeorm';

import { sentenceOf } from './constraint-sentences.js';
import { Refusal } from './errors.js';
import { log } from './log.js';

const TITLES: Record<number, string> = {
  400: 'Not readable',
  401: 'Sign in',
  403: 'Not yours to do',
  404: 'Not there',
  405: 'Not that way',
  409: 'Not booked',
  412: 'Changed meanwhile',
  413: 'Too large',
  415: 'Not JSON',
  422: 'Not readable',
  428: 'Version missing',
  429: 'Wait',
  500: 'Our fault',
  503: 'Not now',
};

/** What is said: the status, the stable word, the sentence, and what else the page needs. */
interface Said {
  status: number;
  code: string;
  detail: string;
  extra?: Record<string, unknown>;
}

/** Writes an error as application/problem+json. */
export function sendProblem(res: Response, { status, code, detail, extra = {} }: Said): void {
  const body: ProblemBody = {
    type: 'about:blank',
    title: TITLES[status] ?? 'Refused',
    status,
    detail,
    instance: String(res.locals.requestId ?? ''),
    code,
    ...extra,
  };
  if (status === 503) res.setHeader('Retry-After', '5');
  if (status === 429 && typeof extra.retryAfter === 'number')
    res.setHeader('Retry-After', String(extra.retryAfter));
  res.status(status).type('application/problem+json').send(JSON.stringify(body));
}

/** The one place where an error becomes an answer; what isn't known is ours, logged and never shown. */
export const problems: ErrorRequestHandler = (error: unknown, _req, res, next) => {
  if (res.headersSent) {
    next(error);
    return;
  }
  if (error instanceof Refusal)
    sendProblem(res, {
      status: error.status,
      code: error.code,
      detail: error.sentence,
      extra: error.extra,
    });
  else if (!sendDatabaseProblem(error, res) && !sendBodyProblem(error, res)) {
    log({
      level: 'error',
      requestId: res.locals.requestId,
      error: error instanceof Error ? error.stack : 'unknown',
    });
    sendProblem(res, {
      status: 500,
      code: 'our_fault',
      detail: 'Something broke on our side. Nothing was booked. Try again, or tell the house.',
    });
  }
};

interface DatabaseError {
  code?: string;
  constraint?: string;
  detail?: string;
}

function sendDatabaseProblem(error: unknown, res: Response): boolean {
  const { code = '', constraint = '', detail } = databaseError(error);
  if (['23505', '23P01', '23514', '23503', '23502'].includes(code)) {
    const facts = code === '23514' ? readFacts(detail) : {};
    const sentence =
      sentenceOf(constraint, facts) ?? 'A rule of the house says no. Nothing was booked.';
    if (code === '23514' || code === '42501')
      log({ level: 'info', requestId: res.locals.requestId, refused: constraint });
    sendProblem(res, {
      status: code === '23503' || code === '23502' ? 422 : 409,
      code: constraint || 'rule',
      detail: sentence,
      extra: { facts },
    });
  } else if (/^22|^2201B/.test(code))
    sendProblem(res, {
      status: 422,
      code: 'not_readable',
      detail: 'Something typed can’t be kept as it is. Look for odd characters or numbers.',
    });
  else if (code === '42501') {
    log({ level: 'error', requestId: res.locals.requestId, denied: constraint || code });
    sendProblem(res, {
      status: 403,
      code: 'denied',
      detail: 'The database does not let this happen.',
    });
  } else if (
    /^(40001|40P01|55P03|57014|53|57P0|08|ECONN|ENOTFOUND|EPIPE|ETIMEDOUT)/.test(code) ||
    isAway(error)
  ) {
    sendProblem(res, {
      status: 503,
      code: 'not_now',
      detail: 'The ledger can’t be reached just now. Nothing was lost; try again in a few seconds.',
    });
  } else return false;
  return true;
}

/** The driver's error, however deep it lies. */
export function databaseError(error: unknown): DatabaseError {
  if (error instanceof QueryFailedError) return error.driverError as DatabaseError;
  return typeof error === 'object' && error !== null ? error : {};
}

const isAway = (error: unknown) =>
  error instanceof Error &&
  /Connection terminated|timeout exceeded when trying to connect|not established|not queryable|Driver not Connected/i.test(
    error.message,
  );

function readFacts(detail: string | undefined): Record<string, string | number> {
  try {
    return detail?.startsWith('{') ? (JSON.parse(detail) as Record<string, string | number>) : {};
  } catch {
    return {};
  }
}

function sendBodyProblem(error: unknown, res: Response): boolean {
  const { type = '', status = 500 } = (error ?? {}) as { type?: string; status?: number };
  if (type === 'entity.too.large')
    sendProblem(res, {
      status: 413,
      code: 'too_large',
      detail: 'That is more than 100 kB; nothing was kept.',
    });
  else if (type === 'encoding.unsupported' || type === 'charset.unsupported')
    sendProblem(res, {
      status: 415,
      code: 'not_json',
      detail: 'Only plain JSON in UTF-8 is read here.',
    });
  else if (status === 404)
    sendProblem(res, {
      status,
      code: 'not_found',
      detail: 'There is nothing at that address. Load the page again.',
    });
  else if (status === 400)
    sendProblem(res, { status: 400, code: 'not_readable', detail: 'The request can’t be read.' });
  else return false;
  return true;
}
