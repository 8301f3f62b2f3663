import { randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { DataSource } from 'typeorm';

import { makeDataSource } from '../../apps/api/src/database/data-source.js';
import { buildServer } from '../../apps/api/src/server.js';
import { freshDatabase, type TestDatabase } from './database.js';

export const SECRET = 'test session secret of enough length';
export const FIRST_PASSWORD = 'first words that were given';
export const OWN_PASSWORD = 'own words chosen afterwards';

// biome-ignore lint/suspicious/noExplicitAny: an answer from outside, whose shape each test states.
export type Body = any;

export interface Answer {
  status: number;
  body: Body;
  headers: Headers;
}

interface Asked {
  body?: unknown;
  headers?: Record<string, string>;
  /** Sent instead of JSON, as it is. */
  raw?: string;
}

/** One browser: its cookie and its token. */
export class Visitor {
  cookie = '';
  csrf = '';

  constructor(readonly base: string) {}

  async ask(
    method: string,
    path: string,
    { body, headers = {}, raw }: Asked = {},
  ): Promise<Answer> {
    const hasBody = body !== undefined || raw !== undefined;
    const response = await fetch(this.base + path, {
      method,
      redirect: 'manual',
      headers: {
        ...(hasBody && { 'content-type': 'application/json' }),
        ...(this.cookie && { cookie: this.cookie }),
        ...(this.csrf && { 'x-csrf-token': this.csrf }),
        ...(method === 'POST' && { 'idempotency-key': randomUUID() }),
        ...headers,
      },
      ...(hasBody && { body: raw ?? JSON.stringify(body) }),
    });
    const [cookie] = response.headers.getSetCookie();
    if (cookie) this.cookie = cookie.split(';')[0] ?? '';
    const text = await response.text();
    return { status: response.status, body: readJson(text), headers: response.headers };
  }

  get = (path: string, headers?: Record<string, string>) =>
    this.ask('GET', path, headers ? { headers } : {});
  post = (path: string, body: unknown = {}, headers?: Record<string, string>) =>
    this.ask('POST', path, { body, ...(headers && { headers }) });

  /** Signs in and takes the session's token. */
  async signIn(email: string, password: string): Promise<Answer> {
    const answer = await this.post('/api/sign-in', { email, password });
    if (answer.status < 300) await this.takeToken();
    return answer;
  }

  async takeToken(): Promise<void> {
    this.csrf = (await this.get('/api/me')).body.csrf;
  }
}

function readJson(text: string): Body {
  try {
    return text ? JSON.parse(text) : undefined;
  } catch {
    return text;
  }
}

export type RoleName = 'owner' | 'dealer' | 'buyer' | 'bookkeeper' | 'retailer';

/** A house over HTTP with somebody signed in for each role, one customer, one supplier and one consignor. */
export class HouseOverHttp {
  readonly people = {} as Record<RoleName, Visitor>;
  drawer = '';
  customer = '';
  supplier = '';
  consignor = '';

  private constructor(
    readonly database: TestDatabase,
    readonly db: DataSource,
    readonly base: string,
    readonly close: () => Promise<void>,
  ) {}

  static async open({ isEmpty = false } = {}): Promise<HouseOverHttp> {
    const database = await freshDatabase();
    const db = await makeDataSource(database.urls.api).initialize();
    const config = {
      databaseUrl: database.urls.api,
      host: '127.0.0.1',
      port: 0,
      webDir: null,
      sessionSecrets: [SECRET],
      isCookieSecure: false,
      isProduction: false,
      trustedProxies: 0,
    };
    const { app, close } = buildServer(config, db);
    const server = createServer(app);
    await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
    const base = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    const house = new HouseOverHttp(database, db, base, async () => {
      server.closeAllConnections();
      await new Promise((closed) => server.close(closed));
      await close();
      await db.destroy();
      await database.drop();
    });
    if (!isEmpty) await house.#fill();
    return house;
  }

  visitor = () => new Visitor(this.base);

  async #fill(): Promise<void> {
    const owner = this.visitor();
    await owner.post('/api/first-owner', {
      house: 'House',
      town: 'Town',
      zone: 'UTC',
      baseCurrency: 'USD',
      step: 10,
      name: 'Olga Owner',
      email: 'owner@house.test',
      password: OWN_PASSWORD,
    });
    await owner.takeToken();
    this.people.owner = owner;
    this.customer = (
      await owner.post('/api/parties', {
        name: 'Customer',
        isCustomer: true,
        creditLimit: 100_000_000,
      })
    ).body.number;
    this.supplier = (
      await owner.post('/api/parties', { name: 'Supplier', isSupplier: true })
    ).body.number;
    this.consignor = (
      await owner.post('/api/parties', { name: 'Consignor', isConsignor: true })
    ).body.number;
    for (const role of ['dealer', 'buyer', 'bookkeeper', 'retailer'] as const) {
      await owner.post('/api/people', {
        name: `${role} person`,
        email: `${role}@house.test`,
        roles: [role],
        password: FIRST_PASSWORD,
        ...(role === 'retailer' && { party: this.customer }),
      });
      this.people[role] = await this.#firstSignIn(`${role}@house.test`);
    }
    this.drawer = (await owner.get('/api/places')).body.find(
      (place: { kind: string }) => place.kind === 'drawer',
    ).id;
  }

  async #firstSignIn(email: string): Promise<Visitor> {
    const visitor = this.visitor();
    await visitor.signIn(email, FIRST_PASSWORD);
    await visitor.post('/api/password', { current: FIRST_PASSWORD, password: OWN_PASSWORD });
    await visitor.takeToken();
    return visitor;
  }

  /** Bought lots, one for each given; their numbers. */
  async takeIn(...lots: Record<string, unknown>[]): Promise<string[]> {
    const answer = await this.people.buyer.post('/api/lots', {
      how: 'purchase',
      party: this.supplier,
      lots: lots.map((lot) => ({ ...STONE, place: this.drawer, ...lot })),
    });
    if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
    return answer.body.numbers;
  }

  /** A memo body for whole lots at a price per carat. */
  memoOf(
    lines: { lot: string; weight: number; pieces: number }[],
    more: Record<string, unknown> = {},
  ) {
    return {
      party: this.customer,
      due: '2999-01-01',
      lines: lines.map((line) => ({ price: 100_000, ...line })),
      ...more,
    };
  }
}

export const STONE = {
  kind: 'stone',
  weight: 1020,
  pieces: 1,
  origin: 'natural',
  shape: 'Round',
  price: 400_000,
  ask: 528_000,
};
export const PARCEL = {
  kind: 'parcel',
  weight: 10_000,
  pieces: 500,
  isEstimated: true,
  origin: 'natural',
  shape: 'Round',
  price: 30_000,
  ask: 42_000,
};
