import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import canonicalize from 'canonicalize';
import type { Board } from '../contract/index.ts';

/** SHA-256 over the RFC 8785 canonical JSON of a board as parsed; 64 lower-case hexadecimal digits. */
export const boardDigestOf = (board: Board): string =>
  bytesToHex(sha256(utf8ToBytes(canonicalize(board) as string)));
