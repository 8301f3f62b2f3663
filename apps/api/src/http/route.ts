import type { Role } from '@foldwell/contracts';
import type { Request, Response } from 'express';
import type { DataSource } from 'typeorm';

/** Who asks, as the database has it now. */
export interface Asker {
  id: string;
  name: string;
  roles: Role[];
  seesCost: boolean;
}

/** What a handler is given beside the request. */
export interface Context {
  db: DataSource;
  person: Asker;
}

/** An answer: a body as JSON, a status, and what else the wire needs. */
export interface Answer {
  status?: number;
  body?: unknown;
  headers?: Record<string, string>;
  /** Text instead of JSON, as it is. */
  text?: string;
}

/** `anyone` may be signed out; `signed-in` is everybody of house or counter. */
export type Allowed = 'anyone' | 'signed-in' | readonly Role[];

export interface Route {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  allowed: Allowed;
  handle(req: Request, ctx: Context, res: Response): Promise<Answer>;
}

export const STAFF = ['owner', 'dealer', 'buyer', 'bookkeeper'] as const satisfies readonly Role[];
