import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

import { brokenRules } from './seeded-tree.js';

const FEATURES = 'apps/api/src/features';
const SCREENS = 'apps/web/src/features';

/** Rule, the file that breaks it, its text. */
const VIOLATIONS: [string, string, string][] = [
  ['no-cycles', `${FEATURES}/lots/about.ts`, "import './round.js';\nexport {};\n"],
  [
    'packages-know-no-app',
    'packages/contracts/src/up.ts',
    "import '../../../apps/api/src/index.js';\n",
  ],
  ['apps-do-not-meet', 'apps/web/src/lib/across.ts', "import '../../../api/src/index.js';\n"],
  ['core-is-pure', 'packages/ledger/src/asks.ts', "import 'pg';\n"],
  ['core-is-pure', 'packages/quantities/src/clock.ts', "import 'node:fs';\n"],
  ['quantities-stand-alone', 'packages/quantities/src/counts.ts', "import '@foldwell/ledger';\n"],
  ['imports-resolve', 'apps/api/src/http/lost.ts', "import './nowhere.js';\n"],
  ['imports-are-declared', 'packages/contracts/src/hoisted.ts', "import 'express';\n"],
  [
    'web-sees-no-ledger',
    'apps/web/src/lib/posts.ts',
    "import '../../../../packages/ledger/src/index.js';\n",
  ],
  ['frame-knows-no-feature', 'apps/api/src/http/knows.ts', "import '../features/lots/list.js';\n"],
  [
    'features-do-not-reach-inside',
    `${FEATURES}/memos/entity.ts`,
    "import '../lots/lot.entity.js';\n",
  ],
  [
    'features-do-not-reach-inside',
    `${FEATURES}/memos/routes.ts`,
    "import '../lots/lots.routes.js';\n",
  ],
  ['web-features-do-not-meet', `${SCREENS}/memos/reach.ts`, "import '../lots/table.js';\n"],
  [
    'web-parts-know-no-feature',
    'apps/web/src/components/row.ts',
    "import '../features/lots/table.js';\n",
  ],
  [
    'shipped-code-needs-no-test-code',
    'apps/api/src/http/builds.ts',
    "import '../../../../packages/tooling/src/index.js';\n",
  ],
  ['start-needs-no-package', 'packages/local-stack/src/early.mjs', "import 'pg';\n"],
  ['model-is-independent', 'tests/properties/model.ts', "import '@foldwell/ledger';\n"],
];

const TARGETS = {
  [`${FEATURES}/lots/round.ts`]: "import './about.js';\nexport {};\n",
  [`${FEATURES}/lots/list.ts`]: 'export const list = 1;\n',
  [`${FEATURES}/lots/lot.entity.ts`]: 'export const lot = 1;\n',
  [`${FEATURES}/lots/lots.routes.ts`]: 'export const routes = 1;\n',
  [`${SCREENS}/lots/table.ts`]: 'export const table = 1;\n',
};

const ALLOWED = {
  [`${FEATURES}/memos/book.ts`]: "import '@foldwell/ledger';\nimport '../lots/list.js';\n",
  'apps/api/src/database/source.ts':
    "import 'typeorm';\nimport '../features/lots/lot.entity.js';\n",
  'packages/ledger/src/reckons.ts': "import '@foldwell/quantities';\n",
  'apps/web/src/app/screen.ts':
    "import '../features/lots/table.js';\nimport '@foldwell/contracts';\n",
  'tests/api/asks.ts': "import 'pg';\nimport '@foldwell/ledger';\n",
};

describe('who may import whom', () => {
  const broken = brokenRules({
    ...TARGETS,
    ...ALLOWED,
    ...Object.fromEntries(VIOLATIONS.map(([, path, text]) => [path, text])),
  });

  it.each(VIOLATIONS)('%s is broken by %s, and the check says so', (rule, path) => {
    expect(broken[path]).toContain(rule);
  });

  it.each(Object.keys(ALLOWED))('%s imports what it may', (path) => {
    expect(broken[path]).toBeUndefined();
  });

  it('has a seeded violation for every rule', () => {
    const path = fileURLToPath(new URL('../../.dependency-cruiser.cjs', import.meta.url));
    const { forbidden } = createRequire(import.meta.url)(path) as { forbidden: { name: string }[] };
    const seeded = new Set(VIOLATIONS.map(([rule]) => rule));
    expect(forbidden.map(({ name }) => name).filter((name) => !seeded.has(name))).toEqual([]);
    expect(readFileSync(path, 'utf8')).not.toContain("severity: 'warn'");
  });
});
