/** `npm run check`: what is fast enough to run at every change; no browser and no database. */
const { ensureInstalled } = require('./lib/install');
const { main } = require('./lib/lifecycle');
const { startStages } = require('./lib/stages');

const fastTests = 'tests/(pricing|shared|components|hooks|architecture|scripts)/';

main(async () => {
  await ensureInstalled();
  const { stage, runTool, runJest, end } = startStages();
  await stage('lint', () => runTool('eslint'));
  await stage('types', () => runTool('types'));
  await stage('fast tests', () => {
    const args = ['--selectProjects', 'node', 'web', '--testPathPattern', fastTests];
    return runJest(args, process.env);
  });
  return end();
});
