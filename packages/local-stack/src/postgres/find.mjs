import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { installFromDebian } from '../debian.mjs';

/** Where Debian keeps PostgreSQL 15; these programs are not on the PATH. */
const DEBIAN_FOLDER = '/usr/lib/postgresql/15/bin';
const CREATE_CLUSTER = '/etc/postgresql-common/createcluster.conf';

/**
 * The folder of PostgreSQL 15's programs, installed from Debian's packages where root may do so.
 * Throws one clear sentence where it may not or cannot.
 * @param {(sentence: string) => void} say
 * @param {string} [folder] where to look
 * @returns {Promise<string>}
 */
export async function findOrInstallPostgres(say, folder = DEBIAN_FOLDER) {
  if (existsSync(join(folder, 'postgres'))) return folder;
  if (process.getuid?.() !== 0) {
    throw new Error(
      'PostgreSQL 15 is not installed: ask for "apt-get install postgresql-15", or start once as root.',
    );
  }
  say('Installing PostgreSQL 15 from Debian.');
  // Debian would otherwise make a cluster of its own on 5432.
  if (!existsSync(CREATE_CLUSTER)) {
    mkdirSync('/etc/postgresql-common', { recursive: true });
    writeFileSync(CREATE_CLUSTER, 'create_main_cluster = false\n');
  }
  await installFromDebian(['postgresql-15']);
  if (!existsSync(join(folder, 'postgres')))
    throw new Error("PostgreSQL 15 could not be installed from Debian's packages.");
  return folder;
}
