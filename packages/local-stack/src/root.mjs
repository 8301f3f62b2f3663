import { fileURLToPath } from 'node:url';

/** The folder of this clone, with a slash at its end. */
export const ROOT = fileURLToPath(new URL('../../../', import.meta.url));

/** @param {string} sentence */
export function say(sentence) {
  process.stdout.write(`${sentence}\n`);
}
