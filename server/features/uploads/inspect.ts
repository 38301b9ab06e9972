import type { OriginalKind } from '../../../shared/contract/index.ts';
import { readAny } from '../../../shared/imports/index.ts';

/**
 * What a file is, by what is in it; for a worker thread.
 *
 * @throws {Refusal} where it is nothing that a table could be made from
 */
export function inspectUpload({ bytes, name }: { bytes: Uint8Array; name: string }): OriginalKind {
  const file = readAny(bytes, name);
  return file.kind === 'code' ? file.code.language : file.kind;
}
