/** Ed25519 signatures (RFC 8032) over canonical JSON; what a stranger needs to check one. */
import { createHash, createPublicKey, sign, verify, type KeyObject } from 'node:crypto';
import { canonicalJson } from './canonical-json';

/** Names a key: the first 16 hexadecimal digits of the SHA-256 of its 32 bytes. */
export function keyIdOf(publicKey: KeyObject): string {
  const { x } = publicKey.export({ format: 'jwk' });
  if (x === undefined) throw new TypeError('This is no Ed25519 key.');
  return createHash('sha256').update(Buffer.from(x, 'base64url')).digest('hex').slice(0, 16);
}

export const publicKeyText = (publicKey: KeyObject): string =>
  publicKey.export({ format: 'pem', type: 'spki' }).toString();

/** Throws when the text is no Ed25519 public key. */
export function readPublicKey(text: string): KeyObject {
  const key = createPublicKey(text);
  if (key.asymmetricKeyType !== 'ed25519') throw new TypeError('This is no Ed25519 key.');
  return key;
}

const bytesOf = (value: unknown) => Buffer.from(canonicalJson(value), 'utf8');

export const signValue = (privateKey: KeyObject, value: unknown): string =>
  sign(null, bytesOf(value), privateKey).toString('hex');

export const isSignedBy = (publicKey: KeyObject, value: unknown, signature: string): boolean =>
  verify(null, bytesOf(value), publicKey, Buffer.from(signature, 'hex'));
