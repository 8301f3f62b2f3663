import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { STATE } from './folders.mjs';

const FILE = join(STATE, 'house.json');

/**
 * Which house this clone keeps. `isReady` is false while the demo house is being made: one that was
 * cut short there is made again from nothing.
 * @typedef {{ kind: 'demo' | 'empty', isReady: boolean, signIns: string }} House
 */

/** @returns {House | null} */
export function keptHouse() {
  return existsSync(FILE) ? /** @type {House} */ (JSON.parse(readFileSync(FILE, 'utf8'))) : null;
}

/** @param {House} house */
export function keepHouse(house) {
  writeFileSync(FILE, JSON.stringify(house));
}

export function forgetHouse() {
  rmSync(FILE, { force: true });
}
