import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const TOP = [
  'DEVELOPERS.md',
  'README.md',
  'apps',
  'docker',
  'package-lock.json',
  'package.json',
  'packages',
  'tests',
  'tsconfig.base.json',
];
const NOT_OURS = /^(node_modules|dist.*|[.].*)$/;

function filesUnder(folder: string): string[] {
  return readdirSync(join(ROOT, folder), { withFileTypes: true })
    .filter(({ name }) => !NOT_OURS.test(name))
    .flatMap((entry) =>
      entry.isDirectory() ? filesUnder(join(folder, entry.name)) : [join(folder, entry.name)],
    );
}

describe('the layout of the repository', () => {
  const files = ['apps', 'packages', 'tests'].flatMap(filesUnder);

  it('has nothing at the top but what belongs there', () => {
    const names = readdirSync(ROOT).filter((name) => !NOT_OURS.test(name));
    expect(names.sort()).toEqual(TOP);
  });

  it('has no folder for leftovers', () => {
    expect(
      files.filter((path) => /[/](utils|helpers|common|shared|services|misc)[/]/.test(path)),
    ).toEqual([]);
  });

  it('names its files in small letters with hyphens', () => {
    const named = files
      .map((path) => path.replace(/.*[/]/, ''))
      .filter((name) => name !== 'Dockerfile');
    expect(named.filter((name) => !/^[a-z0-9]+(-[a-z0-9]+)*([.][a-z0-9-]+)*$/.test(name))).toEqual(
      [],
    );
  });

  it('skips no test, and leaves none alone or to do', () => {
    const tests = files.filter((path) => /[.]test[.]tsx?$/.test(path));
    const set = /\b(it|test|describe)[.](skip|only|todo|skipIf|runIf|fails)\b/;
    expect(tests.filter((path) => set.test(readFileSync(join(ROOT, path), 'utf8')))).toEqual([]);
  });

  it('has an assertion in every file of tests', () => {
    const tests = files.filter((path) => /[.]test[.]tsx?$/.test(path));
    expect(tests.length).toBeGreaterThan(0);
    expect(
      tests.filter((path) => !/\b(expect|assert)/.test(readFileSync(join(ROOT, path), 'utf8'))),
    ).toEqual([]);
  });
});
