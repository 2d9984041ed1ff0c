/** The signing key: Ed25519 as RFC 8032 has it, in a file that only the service reads. */
import { testEnvironment } from '../support/environment';
import { withOwnDatabase } from '../support/server';
import { mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { sign } from 'node:crypto';
import { isSignedBy, keyIdOf, readPublicKey, signValue } from '@/server/chain/signature';
import { signingKey } from '@/server/chain/signing-key';

withOwnDatabase();

/** RFC 8032, section 7.1, test 1; from memory. */
const seed = '9d61b19deffd5a60ba844af492ec2cc44449c5697b326919703bac031cae7f60';
const publicBytes = 'd75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a';
const signatureOfNothing =
  'e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b';

const keys = testEnvironment.DRIFTLESS_KEYS_DIR;

beforeAll(() => {
  mkdirSync(keys, { recursive: true, mode: 0o700 });
  writeFileSync(path.join(keys, 'chain-signing.key'), seed, { mode: 0o600 });
});

test('the 32 bytes of the file are the secret key of the standard', () => {
  const { publicKey, privateKey } = signingKey();
  const { x } = publicKey.export({ format: 'jwk' });
  expect(Buffer.from(String(x), 'base64url').toString('hex')).toBe(publicBytes);
  expect(sign(null, Buffer.alloc(0), privateKey).toString('hex')).toBe(signatureOfNothing);
});

test('the public half lies beside it and is the same key', () => {
  const { keyId } = signingKey();
  const text = readFileSync(path.join(keys, 'chain-signing.public.pem'), 'utf8');
  expect(keyIdOf(readPublicKey(text))).toBe(keyId);
  expect(statSync(path.join(keys, 'chain-signing.key')).mode & 0o777).toBe(0o600);
});

test('a signature fits what was signed, in any order of fields, and nothing else', () => {
  const { publicKey, privateKey } = signingKey();
  const signature = signValue(privateKey, { position: 12, hash: 'ab' });
  expect(isSignedBy(publicKey, { hash: 'ab', position: 12 }, signature)).toBe(true);
  expect(isSignedBy(publicKey, { hash: 'ab', position: 13 }, signature)).toBe(false);
});
