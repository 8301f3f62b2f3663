import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { build } from './build.mjs';
import { findOrInstallChromium } from './debian.mjs';
import { installPackages } from './install.mjs';
import { findOrInstallPostgres } from './postgres/find.mjs';
import { startProcess } from './processes/process.mjs';
import { ROOT, say } from './root.mjs';
import { runCommand } from './run-command.mjs';
import { STATE } from './state/folders.mjs';

const VITEST = [
  'node_modules/vitest/vitest.mjs',
  'run',
  '--config',
  'packages/tooling/vitest.config.ts',
];
/** @type {Record<string, string[]>} */
const PROJECTS = { '--outside': ['outside'], '--bench': ['bench'], '--long': ['beside', 'house'] };

/** `npm test`, `test:long` (`--long`) and `test:outside` (`--outside`), `bench` (`--bench`); other words choose files. */
runCommand(async () => {
  await installPackages();
  await findOrInstallPostgres(say);
  await findOrInstallChromium(say);
  await build();
  const words = process.argv.slice(2);
  const way = words.find((word) => word in PROJECTS) ?? '--long';
  const chosen = PROJECTS[way] ?? [];
  const files = words.filter((word) => !(word in PROJECTS));
  const report = join(STATE, `tests-${process.pid}.json`);
  mkdirSync(STATE, { recursive: true, mode: 0o755 });
  const args = [
    ...VITEST,
    ...chosen.flatMap((name) => ['--project', name]),
    ...files,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ];
  const env = { ...process.env, FOLDWELL_FULL: words.includes('--long') ? '1' : '' };
  const code =
    (await startProcess(process.execPath, args, {
      cwd: ROOT,
      env,
      stdio: 'inherit',
      withinMs: 60_000,
    }).ended) ?? 1;
  const { passed, failed } = count(report, code);
  if (process.env.FOLDWELL_REPORT) {
    writeFileSync(process.env.FOLDWELL_REPORT, JSON.stringify({ passed, failed }));
  }
  say(`${passed} passed, ${failed} failed`);
  rmSync(report, { force: true });
  return code;
});

/**
 * What the last line of a run says. A file that could not be read or set up has no
 * failed test and is a failure all the same.
 * @param {string} report @param {number} code of the run
 */
function count(report, code) {
  const { numPassedTests = 0, numFailedTests = 0, testResults = [] } = read(report);
  const broken = testResults.filter(
    (/** @type {{ status: string, assertionResults: { status: string }[] }} */ file) =>
      file.status === 'failed' && file.assertionResults.every(({ status }) => status !== 'failed'),
  ).length;
  const failed = numFailedTests + broken;
  return { passed: numPassedTests, failed: failed === 0 && code !== 0 ? 1 : failed };
}

/** @param {string} report nothing where the run did not come to its end */
function read(report) {
  return existsSync(report) ? JSON.parse(readFileSync(report, 'utf8')) : {};
}
