/**
 * Checks a file of the history against its manifest, without network, database or service:
 * `verify-export.ts --key public.pem file manifest`. The key is one that was kept, never one that
 * came with the file.
 */
import { readFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { z } from 'zod';
import { readPublicKey } from './chain/signature';
import { complaintsAbout } from './exports/manifest';

/** What is wrong, in sentences. What cannot be read at all is wrong as well. */
function verify(): string[] {
  const { values, positionals } = parseArgs({
    options: { key: { type: 'string' } },
    allowPositionals: true,
  });
  const [file, manifest, ...rest] = positionals;
  if (values.key === undefined || file === undefined || manifest === undefined || rest.length > 0)
    throw new Error('Give --key with the public key, then the file and its manifest.');
  const publicKey = readPublicKey(readFileSync(values.key, 'utf8'));
  try {
    return complaintsAbout(readFileSync(file), readFileSync(manifest, 'utf8'), publicKey);
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof z.ZodError)) throw error;
    return ['The manifest is not readable: it is no manifest of this product, or was damaged.'];
  }
}

const complaints = verify();
process.stdout.write(
  complaints.length === 0
    ? 'The file is the one that was signed.\n'
    : complaints.map((complaint) => `${complaint}\n`).join(''),
);
process.exitCode = complaints.length === 0 ? 0 : 1;
