import { startProcess } from './process.mjs';

/**
 * Runs a program to its end and gives what it wrote. Throws its own words where it fails.
 * @param {string} program
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions} [options] `stdio` is shown instead of kept where it is given
 * @returns {Promise<string>}
 */
export async function runProgram(program, args, options = {}) {
  const { child, ended } = startProcess(program, args, {
    stdio: ['ignore', 'pipe', 'pipe'],
    ...options,
  });
  let out = '';
  let errors = '';
  child.stdout?.setEncoding('utf8').on('data', (/** @type {string} */ part) => {
    out += part;
  });
  child.stderr?.setEncoding('utf8').on('data', (/** @type {string} */ part) => {
    errors += part;
  });
  const code = await ended;
  if (code !== 0) throw new Error((errors || out).trim() || `${program} failed.`);
  return out;
}
