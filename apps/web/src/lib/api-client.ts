import type { ProblemBody } from '@foldwell/contracts';

/** An answer that isn't a success, with the sentence for the person. */
export class Problem extends Error {
  constructor(readonly body: ProblemBody) {
    super(body.detail);
  }
}

/** The API can't be reached; what was typed is still here. */
export class Offline extends Error {
  constructor() {
    super(
      `Not sent. The connection dropped at ${new Date().toTimeString().slice(0, 8)}. What you typed is kept here.`,
    );
  }
}

let csrf = '';

/** The session's token, sent with everything that changes something. */
export function setCsrf(token: string): void {
  csrf = token;
}

interface Asked {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  body?: unknown;
  /** Made once for a form, so that the same booking sent twice posts once. */
  key?: string;
  version?: number;
  signal?: AbortSignal;
}

/** Asks the API for JSON. Throws Problem for a refusal, Offline without an answer. */
export async function api<T>(
  path: string,
  { method = 'GET', body, key, version, signal }: Asked = {},
): Promise<T> {
  let response: Response;
  try {
    response = await fetch(`/api${path}`, {
      method,
      signal: signal ?? null,
      credentials: 'same-origin',
      headers: {
        Accept: 'application/json',
        ...(body !== undefined && { 'Content-Type': 'application/json' }),
        ...(method !== 'GET' && { 'X-Csrf-Token': csrf }),
        ...(key && { 'Idempotency-Key': key }),
        ...(version !== undefined && { 'If-Match': `"v${version}"` }),
      },
      body: body === undefined ? null : JSON.stringify(body),
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new Offline();
  }
  const text = await response.text();
  if (response.ok) return (text ? JSON.parse(text) : undefined) as T;
  throw new Problem(readProblem(text, response.status));
}

function readProblem(text: string, status: number): ProblemBody {
  try {
    return JSON.parse(text) as ProblemBody;
  } catch {
    return {
      type: 'about:blank',
      title: 'Not now',
      status,
      detail: 'The ledger can’t be reached just now. What you typed is kept here.',
      instance: '',
      code: 'not_now',
    };
  }
}
