import { spawnSync } from 'node:child_process';

/** Debian's packages, and the program that each is needed for. */
const PROGRAMS = { hledger: 'hledger', 'docker-compose': 'docker-compose' };

/** Programs of other people that our results are compared with; root installs what is missing. */
export default function setup(): void {
  const missing = Object.entries(PROGRAMS).filter(
    ([, program]) => spawnSync(program, ['--version']).error !== undefined,
  );
  if (missing.length === 0) return;
  const names = missing.map(([name]) => name);
  if (process.getuid?.() !== 0) {
    throw new Error(`Ask for "apt-get install ${names.join(' ')}", which these tests need.`);
  }
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  spawnSync('apt-get', ['-qq', 'update'], { env });
  const { status, stderr } = spawnSync(
    'apt-get',
    ['-qq', '-y', '--no-install-recommends', 'install', ...names],
    { env, encoding: 'utf8' },
  );
  if (status !== 0) throw new Error(`${names.join(' and ')} could not be installed: ${stderr}`);
}
