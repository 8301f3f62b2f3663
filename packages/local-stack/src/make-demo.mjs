import { runProgram } from './processes/run-program.mjs';
import { programArgs } from './programs.mjs';
import { keepHouse, keptHouse } from './state/house.mjs';

/** @typedef {import('./state/house.mjs').House} House */

/**
 * Makes the demo house in an empty database and remembers how to sign in to it: the last line that
 * the program writes. A house that somebody began by hand is never marked as to be made again.
 * @param {NodeJS.ProcessEnv} env
 * @param {string[]} [words] for the program, e.g. `--lots 200000`
 * @returns {Promise<House>}
 */
export async function makeDemo(env, words = []) {
  if (!keptHouse()) keepHouse({ kind: 'demo', isReady: false, signIns: '' });
  const said = await runProgram(process.execPath, [...programArgs('seed'), ...words], { env });
  /** @type {House} */
  const house = { kind: 'demo', isReady: true, signIns: said.trim().split('\n').at(-1) ?? '' };
  keepHouse(house);
  return house;
}
