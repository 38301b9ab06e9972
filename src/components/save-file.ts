import type { GeneratedFile } from '../../shared/contract/index.ts';
import { contentOf } from '../../shared/firmware/index.ts';
import { saveBlob } from './save-text.ts';

/** Saves a generated file with the bytes that the command line writes. */
export function saveFile(file: GeneratedFile): void {
  const type = file.encoding === 'utf-8' ? 'text/plain;charset=utf-8' : 'application/octet-stream';
  saveBlob(file.name, new Blob([new Uint8Array(contentOf(file))], { type }));
}
