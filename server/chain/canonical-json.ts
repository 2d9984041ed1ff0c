import serialize from 'canonicalize';

/**
 * JSON with one spelling (RFC 8785), so that a text can be hashed and signed. Throws on what has
 * none: a number that is not finite, half a surrogate pair, nothing at all. Fields that are
 * undefined are left out.
 */
export function canonicalJson(value: unknown): string {
  const text = serialize(value);
  if (text === undefined) throw new TypeError('There is nothing to write as JSON.');
  // The package passes JSON.stringify's escapes of lone surrogates on, which RFC 8785 forbids.
  if (/(?<!\\)(\\\\)*\\u[dD][89a-fA-F]/.test(text))
    throw new TypeError('A text that is no valid Unicode has no canonical JSON.');
  return text;
}
