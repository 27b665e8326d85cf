import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/**
 * The one text of a JSON value (RFC 8785), for hashing. Feed it plain, schema-validated data only.
 *
 * @throws Error on what JSON has no text for: NaN, infinities, lone surrogates, undefined.
 */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(JSON.parse(JSON.stringify(value)));
  if (text === undefined) throw new Error('There is no JSON text for this value.');
  return text;
}

/** SHA-256 of a text's UTF-8 bytes, as 64 hex digits. */
export function sha256(text: string | Buffer): string {
  return createHash('sha256').update(text).digest('hex');
}
