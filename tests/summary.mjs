/** Adds up what the runners wrote; a runner that ended badly without a failed test counts as one failure. */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

const folder = process.argv[2];
const read = (name) => (existsSync(join(folder, name)) ? readFileSync(join(folder, name), 'utf8') : null);

function staticChecks() {
  const lines = (read('static') ?? '').trim().split('\n').filter(Boolean);
  for (const line of lines.filter((text) => text.endsWith('failed'))) console.log(line);
  return {
    passed: lines.filter((line) => line.endsWith('passed')).length,
    failed: lines.filter((line) => line.endsWith('failed')).length,
  };
}

function runner(name, count) {
  const text = read(`${name}.json`);
  const badEnd = (read(`${name}.code`) ?? '1').trim() !== '0';
  const { passed, failed } = text ? count(JSON.parse(text)) : { passed: 0, failed: 0 };
  if (badEnd && failed === 0) console.log(`${name} ended badly without naming a failed test`);
  return { passed, failed: badEnd ? Math.max(failed, 1) : failed };
}

const totals = [
  staticChecks(),
  runner('vitest', (report) => ({ passed: report.numPassedTests, failed: report.numFailedTests })),
  runner('playwright', (report) => ({
    passed: report.stats.expected + report.stats.flaky,
    failed: report.stats.unexpected,
  })),
];
const passed = totals.reduce((sum, part) => sum + part.passed, 0);
const failed = totals.reduce((sum, part) => sum + part.failed, 0);
console.log(`${passed} passed, ${failed} failed`);
process.exitCode = failed === 0 && passed > 0 ? 0 : 1;
