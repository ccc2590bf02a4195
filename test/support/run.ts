/**
 * npm test: types and lint, the tests in Node, the build, the tests in a browser against the built page.
 * Its last line is `N passed, N failed` over all of them; a check or build counts as one.
 */

import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { provideChromium } from './chromium.ts';

interface Count {
  passed: number;
  failed: number;
  skipped: number;
}

const root = fileURLToPath(new URL('../..', import.meta.url));
const reports = fileURLToPath(new URL('../../node_modules/.cache/test-reports/', import.meta.url));

const counts = [step('types and lint', runCheck), step('tests in Node', () => runProject('node'))];
const build = step('build', () => one(run('npm', ['run', '--silent', 'build'])));
counts.push(build, build.failed > 0 ? skipPage() : step('tests in a browser', runPage));

const total = counts.reduce((a, b) => ({ passed: a.passed + b.passed, failed: a.failed + b.failed, skipped: a.skipped + b.skipped }));
process.exitCode = total.failed > 0 ? 1 : 0;
console.log(`\n${total.passed} passed, ${total.failed} failed${total.skipped > 0 ? `, ${total.skipped} skipped` : ''}`);

function step(name: string, work: () => Count): Count {
  console.log(`\n── ${name} ──`);
  const start = Date.now();
  const count = work();
  console.log(`── ${name}: ${count.passed} passed, ${count.failed} failed, ${((Date.now() - start) / 1000).toFixed(1)} s ──`);
  return count;
}

function runCheck(): Count {
  return one(run('npm', ['run', '--silent', 'check']));
}

function runPage(): Count {
  try {
    provideChromium();
  } catch (error) {
    console.error((error as Error).message);
    return one(false);
  }
  return runProject('page');
}

function skipPage(): Count {
  console.error('The page was not built, so it was not tested: counted as one failure.');
  return one(false);
}

/** Runs one vitest project and reads its counts from the report; a file that does not load, or a crash, counts as a failure. */
function runProject(name: string): Count {
  mkdirSync(reports, { recursive: true });
  const report = `${reports}${name}.json`;
  rmSync(report, { force: true });
  const ok = run('npx', ['vitest', 'run', '--project', name, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`]);
  const count = readReport(report);
  return !ok && count.failed === 0 ? { ...count, failed: 1 } : count;
}

function readReport(path: string): Count {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch {
    console.error('vitest left no report');
    return one(false);
  }
  const report = JSON.parse(text) as {
    numPassedTests: number;
    numFailedTests: number;
    numPendingTests: number;
    numTodoTests: number;
    testResults: { status: string; assertionResults: { status: string }[] }[];
  };
  const unloaded = report.testResults.filter(
    (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
  );
  return {
    passed: report.numPassedTests,
    failed: report.numFailedTests + unloaded.length,
    skipped: report.numPendingTests + report.numTodoTests,
  };
}

function one(ok: boolean): Count {
  return { passed: ok ? 1 : 0, failed: ok ? 0 : 1, skipped: 0 };
}

function run(command: string, args: string[]): boolean {
  return spawnSync(command, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'] }).status === 0;
}
