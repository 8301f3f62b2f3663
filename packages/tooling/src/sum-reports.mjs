import { existsSync, readFileSync } from 'node:fs';

// Each argument is the report of one run, {"passed": n, "failed": n}; one that is not there failed.
let passed = 0;
let failed = 0;
for (const file of process.argv.slice(2)) {
  const report = existsSync(file)
    ? JSON.parse(readFileSync(file, 'utf8'))
    : { passed: 0, failed: 1 };
  passed += report.passed;
  failed += report.failed;
}
process.stdout.write(`${passed} passed, ${failed} failed\n`);
process.exit(failed === 0 && passed > 0 ? 0 : 1);
