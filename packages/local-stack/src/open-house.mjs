import { build } from './build.mjs';
import { makeDemo } from './make-demo.mjs';
import { openDatabase } from './open-database.mjs';
import { programArgs, programEnv } from './programs.mjs';
import { runProgram } from './processes/run-program.mjs';
import { say } from './root.mjs';
import { startApi, startWorker } from './start-processes.mjs';
import { keepHouse, keptHouse } from './state/house.mjs';
import { tellWhere } from './state/lock.mjs';
import { secrets } from './state/secrets.mjs';

/** @typedef {import('./state/house.mjs').House} House */

/**
 * Everything from the database to the open door; ends when one of its processes ends.
 * @param {{ port: number | null, isEmpty: boolean }} wish
 * @returns {Promise<number>} the exit code
 */
export async function openHouse({ port, isEmpty }) {
  const [database] = await Promise.all([openDatabase(), build()]);
  const env = programEnv({ port: database.port, secrets: secrets() });
  await runProgram(process.execPath, programArgs('migrate'), { env: env.migrate });
  const house = await fillHouse(isEmpty, env.seed);
  const worker = startWorker(env.worker);
  const api = await startApi(env.main, port);
  tellWhere({ address: api.address, databasePort: database.port });
  say(`Foldwell is open at ${api.address}. ${await welcome(api.address, house)}`);
  const ended = await Promise.race([
    api.ended.then(() => 'The API'),
    worker.ended.then(() => 'The worker'),
    database.ended.then(() => 'The database'),
  ]);
  throw new Error(
    `${ended} has ended by itself, so all is stopped. Its own words are in the state folder.`,
  );
}

/**
 * @param {boolean} isEmpty
 * @param {NodeJS.ProcessEnv} env of the program that makes the demo house
 * @returns {Promise<House>}
 */
async function fillHouse(isEmpty, env) {
  const kept = keptHouse();
  if (kept) {
    if (isEmpty && kept.kind === 'demo')
      throw new Error(
        'A house is kept here already. "npm run reset" takes it away, then --empty begins a new one.',
      );
    return kept;
  }
  if (isEmpty) {
    /** @type {House} */
    const house = { kind: 'empty', isReady: true, signIns: '' };
    keepHouse(house);
    return house;
  }
  say('Making the demo house.');
  return makeDemo(env);
}

/**
 * What follows the address: how to sign in.
 * @param {string} address @param {House} house
 */
async function welcome(address, { kind, signIns }) {
  if (kind === 'demo') return signIns;
  /** @type {any} */
  const { isEmpty } = await (await fetch(`${address}/api/first-owner`)).json();
  return isEmpty ? 'It is empty; its first page makes the first owner.' : 'Sign in as before.';
}
