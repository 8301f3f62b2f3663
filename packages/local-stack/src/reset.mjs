import { existsSync, rmSync } from 'node:fs';
import { createInterface } from 'node:readline/promises';

import { say } from './root.mjs';
import { runCommand } from './run-command.mjs';
import { ELSEWHERE, makeStateFolder, STATE } from './state/folders.mjs';
import { takeState } from './state/lock.mjs';

runCommand(async () => {
  const folders = [STATE, ELSEWHERE].filter((folder) => existsSync(folder));
  if (folders.length === 0) {
    say('There is no house here to take away.');
    return 0;
  }
  makeStateFolder();
  const holder = takeState('npm run reset');
  if (holder)
    throw new Error(
      `${holder.doing} is at work in this folder (process ${holder.pid}); stop it first.`,
    );
  const lines = createInterface({ input: process.stdin, output: process.stdout });
  const answer = await Promise.race([
    lines.question(
      `This takes away the house, all of its books and papers, in ${folders.join(' and ')}.\nType yes to go on: `,
    ),
    new Promise((resolve) => {
      lines.once('close', () => resolve(''));
    }),
  ]);
  lines.close();
  if (answer !== 'yes') {
    say('Nothing was taken away.');
    return 1;
  }
  for (const folder of folders) rmSync(folder, { recursive: true, force: true });
  say('The house is gone. The next start makes a new one.');
  return 0;
});
