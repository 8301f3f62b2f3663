import { spawnSync } from 'node:child_process';
import { readdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../../../', import.meta.url));
const SOURCES = ['apps', 'packages', 'tests'];

const projects = ['apps', 'packages'].flatMap((folder) =>
  readdirSync(`${ROOT}${folder}`).map((name) => `${folder}/${name}`),
);

/** @type {[string, string[]][]} each a name and what Node runs; never bare tsc, which two packages own */
const steps = [
  ['types', ['node_modules/typescript7/bin/tsc', '-b', ...projects, 'tests']],
  [
    'format and lint',
    [
      'node_modules/@biomejs/biome/bin/biome',
      'check',
      '--error-on-warnings',
      '--max-diagnostics=200',
    ],
  ],
  [
    'imports',
    [
      'node_modules/dependency-cruiser/bin/dependency-cruise.mjs',
      '--config',
      '.dependency-cruiser.cjs',
      ...SOURCES,
    ],
  ],
  ['nothing unused', ['node_modules/knip/bin/knip.js', '--no-progress']],
  [
    'typed rules',
    ['node_modules/eslint/bin/eslint.js', '-c', 'packages/tooling/eslint.config.js', ...SOURCES],
  ],
];

const [only] = process.argv.slice(2);
let failed = 0;
let passed = 0;
for (const [name, args] of steps) {
  if (only && !name.includes(only)) continue;
  const began = Date.now();
  const { status } = spawnSync(process.execPath, args, { cwd: ROOT, stdio: 'inherit' });
  const seconds = ((Date.now() - began) / 1000).toFixed(1);
  process.stdout.write(`${status === 0 ? 'ok  ' : 'FAIL'} ${name} (${seconds} s)\n`);
  if (status === 0) passed += 1;
  else failed += 1;
}
if (process.env.FOLDWELL_REPORT) {
  writeFileSync(process.env.FOLDWELL_REPORT, JSON.stringify({ passed, failed }));
}
process.stdout.write(failed === 0 ? 'All checks passed\n' : `${failed} of the checks failed\n`);
process.exit(failed === 0 ? 0 : 1);
