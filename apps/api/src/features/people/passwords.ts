import bcrypt from 'bcryptjs';

import { ValidationFailed } from '../../http/errors.js';

const COST = 10;
const AT_ONCE = 2;
/** Without a second factor: NIST SP 800-63B-4 as quoted in ASVS 5.0, 6.2. */
const SHORTEST = 15;
const HOUSE_WORDS = ['foldwell', 'diamond', 'carat', 'password', 'ostrey', 'tarn'];

let running = 0;
const waiting: (() => void)[] = [];

/** At most two hashes at once: each holds the one thread of the process for a tenth of a second. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) await new Promise<void>((go) => waiting.push(go));
  running += 1;
  try {
    return await work();
  } finally {
    running -= 1;
    waiting.shift()?.();
  }
}

/** Hashes a password that fits the rules; says which rule it breaks otherwise. */
export async function hashPassword(password: string, about: string[] = []): Promise<string> {
  const problem = passwordProblem(password, about);
  if (problem) throw new ValidationFailed([{ field: 'password', message: problem }]);
  return inTurn(() => bcrypt.hash(password, COST));
}

function passwordProblem(password: string, about: string[]): string | null {
  if ([...password].length < SHORTEST) return `A password has at least ${SHORTEST} characters.`;
  if (bcrypt.truncates(password)) return 'A password has at most 72 bytes; yours is longer.';
  const plain = password.toLowerCase().replace(/[^a-z]/g, '');
  const words = [
    ...HOUSE_WORDS,
    ...about.flatMap((one) => one.toLowerCase().split(/[^a-z]+/)).filter((one) => one.length > 3),
  ];
  const rest = words.reduce((left, word) => left.replaceAll(word, ''), plain);
  if (new Set(password).size < 5 || (plain.length > 0 && rest.length < 4))
    return 'That password is too easy to guess; words of the house alone don’t do.';
  return null;
}

// A hash of nothing anybody knows: an unknown name costs the same work as a known one.
const NOBODY = bcrypt.hashSync(Math.random().toString(36).repeat(3), COST);

/** Whether the password is right; the same work for a name that doesn't exist. */
export async function isRightPassword(password: string, hash: string | null): Promise<boolean> {
  if (bcrypt.truncates(password)) return false;
  const right = await inTurn(() => bcrypt.compare(password, hash ?? NOBODY));
  return right && hash !== null;
}
