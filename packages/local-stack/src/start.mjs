import { installPackages } from './install.mjs';
import { openHouse } from './open-house.mjs';
import { isFree } from './processes/free-port.mjs';
import { say } from './root.mjs';
import { runCommand } from './run-command.mjs';
import { makeStateFolder } from './state/folders.mjs';
import { takeState } from './state/lock.mjs';

const WORDS = new Set(['--empty']);

runCommand(async () => {
  const unknown = process.argv.slice(2).find((word) => !WORDS.has(word));
  if (unknown) throw new Error(`npm start knows --empty only, not ${unknown}.`);
  const port = chosenPort();
  makeStateFolder();
  const holder = takeState('npm start');
  if (holder?.address) {
    say(
      `Foldwell is open already at ${holder.address} (process ${holder.pid}); stop that one to start another.`,
    );
    return 0;
  }
  if (holder)
    throw new Error(
      `${holder.doing} is at work in this folder (process ${holder.pid}); start again when it has ended.`,
    );
  if (port && !(await isFree(port)))
    throw new Error(`Port ${port} is taken. Choose another with PORT.`);
  await installPackages();
  return openHouse({ port, isEmpty: process.argv.includes('--empty') });
});

/** @returns {number | null} the port asked for, null where any will do */
function chosenPort() {
  const text = process.env.PORT;
  if (!text) return null;
  const port = Number(text);
  if (!/^[0-9]{1,5}$/.test(text) || port < 1 || port > 65_535)
    throw new Error(`PORT must be a number from 1 to 65535, not ${text}.`);
  return port;
}
