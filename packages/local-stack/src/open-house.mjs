import { build } from './build.mjs';
import { openDatabase } from './open-database.mjs';
import { programArgs, programEnv } from './programs.mjs';
import { runProgram } from './processes/run-program.mjs';
import { say } from './root.mjs';
import { startApi, startWorker } from './start-processes.mjs';
import { keepHouse, keptHouse } from './state/house.mjs';
import { tellWhere } from './state/lock.mjs';
import { secrets } from './state/secrets.mjs';

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
  say(`Foldwell is open at ${api.address}. ${house.signIns}`);
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
    const house = {
      kind: /** @type {const} */ ('empty'),
      isReady: true,
      signIns: 'Its first page makes the first owner.',
    };
    keepHouse(house);
    return house;
  }
  keepHouse({ kind: 'demo', isReady: false, signIns: '' });
  say('Making the demo house.');
  const lines = (await runProgram(process.execPath, programArgs('seed'), { env }))
    .trim()
    .split('\n');
  const house = { kind: /** @type {const} */ ('demo'), isReady: true, signIns: lines.at(-1) ?? '' };
  keepHouse(house);
  return house;
}
