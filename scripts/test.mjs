// npm test: sets up what the tests need, runs every check and says in its last line how many passed and failed.
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureDebianPackages, TO_TEST } from './set-up/debian-packages.mjs';
import { requireNode } from './set-up/node-version.mjs';
import { ensureNpmPackages } from './set-up/npm-packages.mjs';

const CHECKS = [
  ['Lint', 'eslint', '.'],
  ['Format', 'prettier', '--check', '--log-level', 'warn', '.'],
  ['Types of the server, tests and scripts', 'tsc', '-p', 'tsconfig.json', '--noEmit'],
  ['Types of the pages', 'tsc', '-p', 'web/tsconfig.json', '--noEmit'],
  ['Arrows between the layers', 'depcruise', '--config', '.dependency-cruiser.cjs', 'api', 'web'],
];

/** Settings of an installation on this machine must not reach the tests. */
function testEnvironment() {
  const own = Object.entries(process.env).filter(([name]) => !name.startsWith('ORIEL_') && name !== 'NODE_ENV');
  return { ...Object.fromEntries(own), AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true' };
}

function run(program, ...args) {
  const options = { stdio: ['ignore', 'inherit', 'inherit'], env: testEnvironment() };
  return spawnSync(process.execPath, [path.join('node_modules/.bin', program), ...args], options).status === 0;
}

function readReport(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

/** Counts tests; a file that could not even be loaded, a skipped test and an error outside any test count as failed. */
function count(report, endedWell) {
  if (!report) return { passed: 0, failed: 1 };
  const unloaded = report.testResults.filter((file) => file.status === 'failed' && file.assertionResults.length === 0).length;
  const skipped = report.numPendingTests + (report.numTodoTests ?? 0);
  if (skipped > 0) console.log(`${skipped} tests were skipped, which counts as failed: every test runs here.`);
  const failed = report.numFailedTests + unloaded + skipped;
  return { passed: report.numPassedTests, failed: failed === 0 && !endedWell ? 1 : failed };
}

function runTests() {
  console.log('\nTests');
  const dir = fs.mkdtempSync(path.join(os.tmpdir(), 'oriel-tests-'));
  const file = path.join(dir, 'report.json');
  try {
    const endedWell = run('vitest', 'run', '--reporter=default', '--reporter=json', `--outputFile.json=${file}`);
    return count(readReport(file), endedWell);
  } finally {
    fs.rmSync(dir, { recursive: true, force: true });
  }
}

function setUp() {
  requireNode();
  const root = path.dirname(path.dirname(fileURLToPath(import.meta.url)));
  process.chdir(root);
  ensureDebianPackages(TO_TEST, 'npm test');
  ensureNpmPackages(root);
}

function runEverything() {
  let [passed, failed] = [0, 0];
  for (const [name, ...command] of CHECKS) {
    console.log(`\n${name}`);
    const good = run(...command);
    console.log(good ? '  passed' : '  FAILED');
    if (good) passed += 1;
    else failed += 1;
  }
  const tests = runTests();
  return { passed: passed + tests.passed, failed: failed + tests.failed };
}

try {
  setUp();
  const { passed, failed } = runEverything();
  console.log(`\n${passed} passed, ${failed} failed`);
  process.exitCode = failed === 0 ? 0 : 1;
} catch (error) {
  console.error(error.message);
  console.log('0 passed, 1 failed');
  process.exitCode = 1;
}
