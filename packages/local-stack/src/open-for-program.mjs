import { build } from './build.mjs';
import { installPackages } from './install.mjs';
import { openDatabase } from './open-database.mjs';
import { runProgram } from './processes/run-program.mjs';
import { programArgs, programEnv } from './programs.mjs';
import { makeStateFolder } from './state/folders.mjs';
import { takeState } from './state/lock.mjs';
import { secrets } from './state/secrets.mjs';

/**
 * This clone's database for one of the API's programs: the one that `npm start` has open, else its own
 * for as long as the command takes, with its tables up to date.
 * @param {string} doing the command, for whoever finds the state taken
 * @returns {Promise<ReturnType<typeof programEnv>>}
 */
export async function openForProgram(doing) {
  makeStateFolder();
  const holder = takeState(doing);
  if (holder && !holder.address) {
    throw new Error(
      `${holder.doing} is at work in this folder (process ${holder.pid}); try again when it has ended.`,
    );
  }
  if (!holder) await installPackages();
  await build();
  const port = holder?.databasePort ?? (await openDatabase()).port;
  const env = programEnv({ port, secrets: secrets() });
  if (!holder && doing !== 'npm run migrate') {
    await runProgram(process.execPath, programArgs('migrate'), { env: env.migrate });
  }
  return env;
}
