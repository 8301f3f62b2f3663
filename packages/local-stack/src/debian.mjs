import { existsSync } from 'node:fs';

import { runProgram } from './processes/run-program.mjs';

const CHROMIUM = '/usr/bin/chromium';

/**
 * Installs packages of Debian's, as root.
 * @param {string[]} names
 */
export async function installFromDebian(names) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  await runProgram('apt-get', ['-qq', 'update'], { env });
  const keep = ['-o', 'Dpkg::Options::=--force-confold'];
  await runProgram('apt-get', ['-qq', '-y', ...keep, 'install', ...names], { env });
}

/**
 * The browser that the tests use. Throws one sentence where it is neither there nor may be installed.
 * @param {(sentence: string) => void} say
 */
export async function findOrInstallChromium(say) {
  if (existsSync(CHROMIUM)) return;
  if (process.getuid?.() !== 0) {
    throw new Error('Chromium is not installed: ask for "apt-get install chromium".');
  }
  say('Installing Chromium from Debian.');
  await installFromDebian(['chromium']);
}
