/** The stages of checking: each prints what its tool says, and the sum of all tests comes last. */
const fs = require('node:fs');
const os = require('node:os');
const path = require('node:path');
const { onStop, run, say } = require('./lifecycle');
const { root } = require('./paths');

const tool = (...parts) => path.join(root, 'node_modules', ...parts);

const commands = {
  prettier: [tool('prettier', 'bin', 'prettier.cjs'), '--check', '--log-level=warn', '.'],
  eslint: [
    tool('eslint', 'bin', 'eslint.js'),
    ...['.', '--max-warnings', '0', '--cache', '--cache-strategy', 'content'],
    ...['--cache-location', path.join(root, '.cache', 'eslint', path.sep)],
  ],
  types: [tool('typescript', 'bin', 'tsc'), '--noEmit', '--project', root],
};

/** Collects how the stages went; `end()` prints the sum and gives the exit code. */
function startStages() {
  const sum = { passed: 0, failed: 0 };
  const failedStages = [];

  async function stage(name, work) {
    const began = Date.now();
    say(`\n== ${name}`);
    const hasPassed = await work();
    if (!hasPassed) failedStages.push(name);
    const seconds = Math.round((Date.now() - began) / 1000);
    say(`== ${name}: ${hasPassed ? 'passed' : 'FAILED'} after ${seconds} s`);
  }

  const runTool = async (name) => (await run(process.execPath, commands[name])) === 0;

  /** One run of Jest, counted from its own report. A file that could not run counts as failed. */
  async function runJest(args, environment) {
    // Whatever a test leaves in the temporary folder goes with this one.
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-jest-'));
    onStop(() => fs.rmSync(folder, { recursive: true, force: true }));
    const report = path.join(folder, 'report.json');
    const jest = [tool('jest', 'bin', 'jest.js'), '--json', `--outputFile=${report}`, ...args];
    const code = await run(process.execPath, jest, {
      env: { ...environment, TMPDIR: folder },
      // With --json Jest repeats the report on standard output, which nobody wants to read.
      stdio: ['ignore', 'ignore', 'inherit'],
    });
    if (!fs.existsSync(report)) return false;
    const counts = JSON.parse(fs.readFileSync(report, 'utf8'));
    sum.passed += counts.numPassedTests;
    sum.failed += counts.numFailedTests + counts.numRuntimeErrorTestSuites;
    return code === 0;
  }

  function end() {
    const names = failedStages.join(', ');
    say(names === '' ? '\nEvery stage passed.' : `\nFailed: ${names}.`);
    say(`${sum.passed} passed, ${sum.failed} failed`);
    return failedStages.length === 0 ? 0 : 1;
  }

  return { stage, runTool, runJest, end };
}

module.exports = { startStages };
