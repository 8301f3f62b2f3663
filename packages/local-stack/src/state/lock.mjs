import { readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { STATE } from './folders.mjs';

const FILE = join(STATE, 'running.json');

/**
 * Who works on this clone's state now.
 * @typedef {object} Holder
 * @property {number} pid
 * @property {string} since the process's start in the machine's own clock, so that a pid used again is told apart
 * @property {string} doing
 * @property {string} [address] of the app, once it is open
 * @property {number} [databasePort]
 */

/**
 * Takes the state for this process. Null when it was taken; else who has it.
 * @param {string} doing
 * @returns {Holder | null}
 */
export function takeState(doing) {
  const own = { pid: process.pid, since: startOf(process.pid) ?? '', doing };
  for (;;) {
    try {
      writeFileSync(FILE, JSON.stringify(own), { flag: 'wx', mode: 0o600 });
      process.on('exit', release);
      return null;
    } catch (error) {
      if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error;
    }
    const holder = readHolder();
    if (holder && startOf(holder.pid) === holder.since) return holder;
    rmSync(FILE, { force: true });
  }
}

/** Tells the other commands where this one's database and app are. @param {{ address?: string, databasePort: number }} where */
export function tellWhere(where) {
  const next = `${FILE}.next`;
  writeFileSync(next, JSON.stringify({ ...readHolder(), ...where }), { mode: 0o600 });
  renameSync(next, FILE);
}

/** @returns {Holder | null} null where it is gone or half written */
function readHolder() {
  try {
    return /** @type {Holder} */ (JSON.parse(readFileSync(FILE, 'utf8')));
  } catch {
    return null;
  }
}

function release() {
  if (readHolder()?.pid === process.pid) rmSync(FILE, { force: true });
}

/** The 22nd field of /proc/PID/stat; null where nothing runs under this number. @param {number} pid */
function startOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null;
  } catch {
    return null;
  }
}
