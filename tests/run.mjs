// `npm test`: everything that must hold, from an empty machine with Node.js and npm on. Closes with `N passed, N failed`.
// `npm run check`: the static checks alone.
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { ensureBuilt, ensureInstalled, root } from '../server/tasks/prepare.mjs';

const onlyStatic = process.argv.includes('--static');
const totals = { passed: 0, failed: 0 };
const bin = (name) => path.join(root, 'node_modules', '.bin', name);

ensureInstalled();
check('types', bin('vue-tsc'), ['-b']);
check('lint', bin('eslint'), ['.', '--max-warnings', '0']);
check('format', bin('prettier'), ['--check', '--log-level', 'warn', '.']);
check('imports', bin('depcruise'), [
  '--config',
  'tests/lint/dependency-rules.cjs',
  '--output-type',
  'err',
  'shared',
  'server',
  'src',
  'fakes',
]);
check('dead code', bin('knip'), ['--config', 'tests/lint/knip.json']);
if (!onlyStatic) {
  ensurePrograms();
  ensureBuilt();
  runVitest();
}
console.log(`\n${totals.passed} passed, ${totals.failed} failed`);
process.exit(totals.failed === 0 && totals.passed > 0 ? 0 : 1);

function check(name, command, args) {
  console.log(`\n— ${name}`);
  const { status } = spawnSync(command, args, { cwd: root, stdio: 'inherit' });
  count(status === 0 ? 1 : 0, status === 0 ? 0 : 1);
  console.log(status === 0 ? `${name}: good` : `${name}: FAILED`);
}

/** Chromium for the browser tests and poppler to look at PDFs: taken from Debian's packages where apt can. */
function ensurePrograms() {
  const missing = Object.entries({ chromium: '/usr/bin/chromium', 'poppler-utils': '/usr/bin/pdftoppm' })
    .filter(([, file]) => !existsSync(file))
    .map(([name]) => name);
  if (missing.length === 0) return;
  console.log(`Installing ${missing.join(', ')} …`);
  const apt = (args) => spawnSync('apt-get', args, { stdio: ['ignore', 'ignore', 'inherit'] }).status === 0;
  if (apt(['update', '-qq']) && apt(['install', '-y', '-qq', '--no-install-recommends', ...missing])) return;
  console.error(
    `The tests need ${missing.join(' and ')} and apt could not install them. Install them and run the tests again.`,
  );
  count(0, 1);
}

function runVitest() {
  console.log('\n— tests');
  const folder = mkdtempSync(path.join(tmpdir(), 'limestead-tests-'));
  const report = path.join(folder, 'report.json');
  const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const { status } = spawnSync(bin('vitest'), args, {
    cwd: root,
    stdio: 'inherit',
    env: { ...process.env, CI: 'true' },
  });
  if (!existsSync(report)) {
    count(0, 1);
    return;
  }
  const { numPassedTests, numTotalTests } = JSON.parse(readFileSync(report, 'utf8'));
  rmSync(folder, { recursive: true });
  const failed = numTotalTests - numPassedTests;
  // A suite that could not even start fails without a failing test.
  count(numPassedTests, status !== 0 && failed === 0 ? 1 : failed);
}

function count(passed, failed) {
  totals.passed += passed;
  totals.failed += failed;
}
