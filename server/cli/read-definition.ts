import { readFileSync } from 'node:fs';
import { findJsonFault, limits, Refusal } from '../../shared/contract/index.ts';

/**
 * Reads a JSON document from a file, or from standard input where its name is `-`.
 *
 * @throws {Refusal} where it cannot be read, is too large, is no UTF-8, or is no JSON (with line and column)
 */
export async function readDefinition(file: string): Promise<unknown> {
  const name = file === '-' ? 'standard input' : file;
  const bytes = file === '-' ? await readStandardInput() : readFile(file);
  if (bytes.length > limits.requestBytes) {
    throw new Refusal({
      path: name,
      value: 'a larger document',
      allowed: `at most ${limits.requestBytes} bytes`,
    });
  }
  return parseJson(decode(bytes, name), name);
}

function readFile(file: string): Buffer {
  try {
    return readFileSync(file);
  } catch (error) {
    throw new Refusal({
      path: file,
      value: reasonOf(error),
      allowed: 'a file that can be read, or - for standard input',
    });
  }
}

async function readStandardInput(): Promise<Buffer> {
  const parts: Buffer[] = [];
  let length = 0;
  for await (const part of process.stdin as AsyncIterable<Buffer>) {
    parts.push(part);
    length += part.length;
    // What is more is refused, and need not be kept.
    if (length > limits.requestBytes) break;
  }
  return Buffer.concat(parts);
}

function decode(bytes: Buffer, name: string): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new Refusal({ path: name, value: 'a document in another encoding', allowed: 'UTF-8' });
  }
}

function parseJson(text: string, name: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    const fault = findJsonFault(text);
    if (fault === undefined) throw error;
    const { line, column, found, allowed } = fault;
    throw new Refusal({ path: `${name}, line ${line}, column ${column}`, value: found, allowed });
  }
}

const systemReasons: Readonly<Record<string, string>> = {
  ENOENT: 'a path that does not exist',
  EEXIST: 'the path of something else',
  EACCES: 'a path without permission',
  EPERM: 'a path without permission',
  EISDIR: 'a folder',
  ENOTDIR: 'a path through a file',
  EROFS: 'a read-only place',
  ENOSPC: 'a full disk',
  ENAMETOOLONG: 'a name that is too long',
};

/** What the operating system objected to, in words. */
export function reasonOf(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : undefined;
  if (code === undefined) throw error;
  return systemReasons[code] ?? code;
}
