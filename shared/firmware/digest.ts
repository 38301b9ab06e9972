import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import canonicalize from 'canonicalize';
import { Refusal, showValue, type Definition } from '../contract/index.ts';

export interface DigestInput {
  /** As parsed, defaults filled in. */
  readonly definition: Definition;
  /** Version of the engine that built the codes. */
  readonly engineVersion: string;
  /** One code an entry, before complement, coding and fold. */
  readonly codes: ArrayLike<number>;
}

/**
 * Digest of a table: SHA-256 over the RFC 8785 canonical JSON, in UTF-8, of `{ definition, engineVersion, codes }`.
 *
 * @returns 64 lower-case hexadecimal digits.
 * @throws {Refusal} where the name holds half a surrogate pair: RFC 8785 §3.2.2.2 has no form for it.
 */
export function digestOf({ definition, engineVersion, codes }: DigestInput): string {
  if (/\p{Surrogate}/u.test(definition.name)) {
    throw new Refusal({
      path: 'name',
      value: showValue(definition.name),
      allowed: 'whole characters, no half of a surrogate pair',
    });
  }
  // The members in the order of RFC 8785. Codes print as themselves; the package would take most of the time for them.
  const parts = [
    `"codes":[${Array.from(codes).join(',')}]`,
    `"definition":${canonicalJson(definition)}`,
    `"engineVersion":${canonicalJson(engineVersion)}`,
  ];
  return bytesToHex(sha256(utf8ToBytes(`{${parts.join(',')}}`)));
}

/** JSON as RFC 8785 writes it: keys sorted by UTF-16 code units, numbers as ECMAScript prints them, no spaces. */
export function canonicalJson(value: object | string): string {
  return canonicalize(value) as string;
}
