/**
 * The key that heads and manifests are signed with. Its public half lies beside it as a PEM file,
 * for whoever checks an export without this service.
 */
import { createPrivateKey, createPublicKey, type KeyObject } from 'node:crypto';
import { existsSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { env } from '../env';
import { keyNamed } from '../keys';
import { log } from '../log';
import { keyIdOf, publicKeyText } from './signature';

export type SigningKey = { privateKey: KeyObject; publicKey: KeyObject; keyId: string };

const keyName = 'chain-signing';

/** What stands before the 32 bytes of an Ed25519 private key in PKCS #8 (RFC 8410, section 7). */
const pkcs8Prefix = Buffer.from('302e020100300506032b657004220420', 'hex');

function keepPublicKey({ publicKey, keyId }: SigningKey) {
  const file = path.join(env.keysDir, `${keyName}.public.pem`);
  if (existsSync(file)) return;
  writeFileSync(file, publicKeyText(publicKey), { mode: 0o644 });
  log.info({ keyId, file }, 'the public key for checking exports was written');
}

function readSigningKey(): SigningKey {
  const privateKey = createPrivateKey({
    key: Buffer.concat([pkcs8Prefix, keyNamed(keyName)]),
    format: 'der',
    type: 'pkcs8',
  });
  const publicKey = createPublicKey(privateKey);
  const key = { privateKey, publicKey, keyId: keyIdOf(publicKey) };
  keepPublicKey(key);
  return key;
}

let key: SigningKey | null = null;

export const signingKey = (): SigningKey => (key ??= readSigningKey());
