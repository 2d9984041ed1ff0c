/** Whether something has to be made again: the hash of what it was made from, kept beside it. */
const crypto = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');

function filesUnder(entry) {
  if (!fs.existsSync(entry)) return [];
  if (fs.statSync(entry).isFile()) return [entry];
  return fs
    .readdirSync(entry)
    .sort()
    .flatMap((name) => filesUnder(path.join(entry, name)));
}

/** One hash over names and contents of files and whole folders, in a fixed order. */
function hashInputs(base, entries) {
  const hash = crypto.createHash('sha256').update(process.version);
  for (const file of entries.flatMap((entry) => filesUnder(path.join(base, entry)))) {
    const content = fs.readFileSync(file);
    hash.update(`\0${path.relative(base, file)}\0${content.length}\0`).update(content);
  }
  return hash.digest('hex');
}

const stampFile = (folder) => path.join(folder, '.made-from');

function isMadeFrom(folder, hash) {
  const file = stampFile(folder);
  return fs.existsSync(file) && fs.readFileSync(file, 'utf8') === hash;
}

/** The last step of making: a folder without it counts as half made. */
function writeStamp(folder, hash) {
  fs.writeFileSync(stampFile(folder), hash);
}

module.exports = { hashInputs, isMadeFrom, writeStamp };
