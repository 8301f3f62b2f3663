import { spawnSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const WORKSPACES = [
  'apps/api',
  'apps/web',
  'packages/contracts',
  'packages/ledger',
  'packages/local-stack',
  'packages/quantities',
  'packages/tooling',
  'tests',
];
const INSTALLED = ['express', 'pg', 'react', 'typeorm', 'class-validator'];

interface Cruise {
  summary: { violations: { from: string; rule: { name: string } }[] };
}

/**
 * A small tree with this repository's own rules and package.json files, and the given files in it.
 * Gives the names of the rules that each file breaks.
 */
export function brokenRules(files: Record<string, string>): Record<string, string[]> {
  const tree = mkdtempSync(join(tmpdir(), 'foldwell-architecture-'));
  try {
    layTree(tree);
    for (const [path, text] of Object.entries(files)) write(join(tree, path), text);
    return cruise(tree);
  } finally {
    rmSync(tree, { recursive: true, force: true });
  }
}

function layTree(tree: string): void {
  for (const file of ['.dependency-cruiser.cjs', 'tsconfig.base.json', 'package.json']) {
    cpSync(join(ROOT, file), join(tree, file));
  }
  mkdirSync(join(tree, 'node_modules/@foldwell'), { recursive: true });
  for (const workspace of WORKSPACES) {
    write(join(tree, workspace, 'src/index.ts'), 'export const one = 1;\n');
    cpSync(join(ROOT, workspace, 'package.json'), join(tree, workspace, 'package.json'));
    symlinkSync(
      join('../..', workspace),
      join(tree, 'node_modules/@foldwell', workspace.replace(/.*[/]/, '')),
    );
  }
  for (const name of INSTALLED) {
    symlinkSync(join(ROOT, 'node_modules', name), join(tree, 'node_modules', name));
  }
}

function cruise(tree: string): Record<string, string[]> {
  const program = join(ROOT, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs');
  const args = ['--config', '.dependency-cruiser.cjs', '--output-type', 'json'];
  const { stdout, stderr } = spawnSync(
    process.execPath,
    [program, ...args, 'apps', 'packages', 'tests'],
    { cwd: tree, encoding: 'utf8', maxBuffer: 100_000_000 },
  );
  if (!stdout.startsWith('{')) throw new Error(stderr || stdout);
  const broken: Record<string, string[]> = {};
  for (const { from, rule } of (JSON.parse(stdout) as Cruise).summary.violations) {
    broken[from] = [...(broken[from] ?? []), rule.name];
  }
  return broken;
}

function write(path: string, text: string): void {
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, text);
}
