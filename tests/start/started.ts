import { type ChildProcess, spawn } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import { expect, vi } from 'vitest';

import { type Clone, ORDINARY } from './clone.js';

export interface Started {
  child: ChildProcess;
  /** All that it has said so far. */
  said(): string;
  /** The address it ends up saying that it is open at; its words as an error where it ends first. */
  address(): Promise<string>;
  /** Its exit code. */
  ended: Promise<number | null>;
}

interface Wish {
  args?: string[];
  env?: Record<string, string>;
  /** What it is told when it asks. */
  answer?: string;
  /** A shell in between, as npm puts one; to be killed. */
  hasParent?: boolean;
}

/** Runs one of the clone's commands, with node itself. */
export function run(clone: Clone, command: string, wish: Wish = {}): Started {
  const program = join(clone.folder, `packages/local-stack/src/${command}.mjs`);
  const line = [process.execPath, program, ...(wish.args ?? [])];
  const [first = '', ...rest] = wish.hasParent
    ? ['/bin/sh', '-c', `${line.join(' ')} & wait`]
    : line;
  const isOther = clone.user === 'ordinary' && process.getuid?.() === 0;
  const child = spawn(first, rest, {
    cwd: clone.folder,
    env: { PATH: process.env.PATH, HOME: clone.folder, ...wish.env },
    stdio: ['pipe', 'pipe', 'pipe'],
    ...(isOther && ORDINARY),
  });
  child.stdin.end(wish.answer ?? '');
  let text = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding('utf8').on('data', (part: string) => {
      text += part;
    });
  }
  const ended = new Promise<number | null>((resolve) => child.once('exit', resolve));
  return { child, said: () => text, ended, address: () => addressIn(() => text, ended) };
}

async function addressIn(said: () => string, ended: Promise<unknown>): Promise<string> {
  let hasEnded = false;
  void ended.then(() => {
    hasEnded = true;
  });
  await vi.waitUntil(() => hasEnded || /is open at/.test(said()), {
    timeout: 240_000,
    interval: 50,
  });
  const found = /is open at (http:\S+?)[.]?\s/.exec(said())?.[1];
  if (!found) throw new Error(`It never opened: ${said()}`);
  return found;
}

/** Every process whose command line names the clone. */
export function processesOf(clone: Clone): string[] {
  return readdirSync('/proc')
    .filter((name) => /^[0-9]+$/.test(name))
    .map(commandLine)
    .filter((line) => line.includes(clone.folder));
}

function commandLine(pid: string): string {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').replaceAll('\0', ' ');
  } catch {
    return '';
  }
}

/** Nothing of the clone runs, and nothing listens where it did. */
export async function expectAllGone(clone: Clone, ports: number[]): Promise<void> {
  await vi.waitFor(() => expect(processesOf(clone)).toEqual([]), { timeout: 30_000, interval: 50 });
  for (const port of ports) expect(await listens(port), `port ${port}`).toBe(false);
}

function listens(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const socket = connect({ port, host: '127.0.0.1' });
    socket.once('error', () => resolve(false));
    socket.once('connect', () => {
      socket.destroy();
      resolve(true);
    });
  });
}

/** The ports of the app and of the database, as the clone itself notes them. */
export function portsOf(clone: Clone): number[] {
  const { address, databasePort } = JSON.parse(
    readFileSync(join(clone.folder, '.foldwell/running.json'), 'utf8'),
  ) as { address: string; databasePort: number };
  return [Number(new URL(address).port), databasePort];
}
