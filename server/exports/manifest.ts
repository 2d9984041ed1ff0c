/** The signed sheet that goes with a file: whoever has the public key can check the file with it. */
import { createHash, type KeyObject } from 'node:crypto';
import { manifestSchema, type Manifest } from '@/shared/contracts/exports';
import { isSignedBy, keyIdOf, signValue } from '../chain/signature';

export const sha256Of = (bytes: Uint8Array): string =>
  createHash('sha256').update(bytes).digest('hex');

export type UnsignedManifest = Omit<Manifest, 'keyId' | 'signature'>;

export function signManifest(unsigned: UnsignedManifest, privateKey: KeyObject, keyId: string) {
  const signed = { ...unsigned, keyId };
  return { ...signed, signature: signValue(privateKey, signed) };
}

/** What is wrong with a file and its manifest, in sentences; nothing when both are as signed. */
export function complaintsAbout(
  bytes: Uint8Array,
  manifestText: string,
  publicKey: KeyObject,
): string[] {
  const { signature, ...signed } = manifestSchema.parse(JSON.parse(manifestText));
  const keyId = keyIdOf(publicKey);
  if (signed.keyId !== keyId)
    return [`The manifest was signed with key ${signed.keyId}, not with the given key ${keyId}.`];
  if (!isSignedBy(publicKey, signed, signature))
    return ['The manifest was changed after it was signed: its signature does not fit.'];
  const complaints: string[] = [];
  if (bytes.length !== signed.bytes)
    complaints.push(`The file has ${bytes.length} bytes, the manifest says ${signed.bytes}.`);
  if (sha256Of(bytes) !== signed.sha256)
    complaints.push('The file was changed after it was written: its SHA-256 does not fit.');
  return complaints;
}
