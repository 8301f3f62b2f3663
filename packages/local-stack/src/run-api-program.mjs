import { build } from './build.mjs';
import { installPackages } from './install.mjs';
import { openDatabase } from './open-database.mjs';
import { startProcess } from './processes/process.mjs';
import { programArgs, programEnv } from './programs.mjs';
import { makeStateFolder } from './state/folders.mjs';
import { takeState } from './state/lock.mjs';
import { secrets } from './state/secrets.mjs';

/**
 * Runs `migrate`, `verify` or `seed` on this clone's database: the one that `npm start` has open, else
 * its own for as long as it takes.
 * @param {'migrate' | 'verify' | 'seed'} name
 * @returns {Promise<number>} the program's exit code
 */
export async function runApiProgram(name) {
  makeStateFolder();
  const holder = takeState(`npm run ${name}`);
  if (holder && !holder.address)
    throw new Error(
      `${holder.doing} is at work in this folder (process ${holder.pid}); try again when it has ended.`,
    );
  if (!holder) await installPackages();
  await build();
  const port = holder?.databasePort ?? (await openDatabase()).port;
  const args = [...programArgs(name), ...process.argv.slice(2)];
  const env = programEnv({ port, secrets: secrets() });
  if (!holder && name !== 'migrate') {
    await startProcess(process.execPath, programArgs('migrate'), {
      env: env.migrate,
      stdio: 'ignore',
    }).ended;
  }
  return (
    (await startProcess(process.execPath, args, { env: env[name], stdio: 'inherit' }).ended) ?? 1
  );
}
