/**
 * `npm run --silent value -- cases.json`: values a file of requests. Standard output is the answer and
 * nothing else, so that installing the packages, when they are new, speaks on the other channel.
 */
const path = require('node:path');
const { main, run } = require('./lib/lifecycle');

main(async () => {
  const installed = await run(process.execPath, [path.join(__dirname, 'install.js')], {
    stdio: ['inherit', process.stderr.fd, 'inherit'],
  });
  if (installed !== 0) return installed;
  const script = path.join(__dirname, 'value.ts');
  return run(process.execPath, ['--require', 'tsx/cjs', script, ...process.argv.slice(2)]);
});
