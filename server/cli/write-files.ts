import { randomBytes } from 'node:crypto';
import { lstat, mkdir, open, rename, rm, stat } from 'node:fs/promises';
import { basename, dirname, join, resolve } from 'node:path';
import { Refusal, showValue, type GeneratedFile } from '../../shared/contract/index.ts';
import { contentOf } from '../../shared/firmware/index.ts';
import { reasonOf } from './read-definition.ts';

/**
 * Writes files into a folder, made where it is missing. Each is written whole under a temporary name first, and only
 * when all are does each take its own, so that nobody ever reads half a file; a link in its place is replaced, not
 * followed.
 *
 * @returns the paths written
 * @throws {Refusal} where the folder cannot be written to; then nothing in it has changed.
 */
export async function writeFiles(folder: string, files: readonly GeneratedFile[]): Promise<string[]> {
  const places = files.map((file) => {
    const { name } = file;
    if (basename(name) !== name || name.startsWith('.')) throw new Error(`${name} is no plain file name.`);
    const suffix = randomBytes(6).toString('hex');
    return {
      content: contentOf(file),
      path: join(folder, name),
      temporary: join(folder, `.${name}.${suffix}.tmp`),
    };
  });
  try {
    await makeFolder(folder);
    for (const { path } of places) await refuseFolder(path);
    for (const { temporary, content } of places) await writeWhole(temporary, content);
    for (const { temporary, path } of places) await rename(temporary, path);
  } catch (error) {
    await Promise.all(places.map(({ temporary }) => rm(temporary, { force: true }).catch(() => undefined)));
    if (error instanceof Refusal) throw error;
    throw new Refusal({
      path: '--out',
      value: `${showValue(folder)}, ${reasonOf(error)},`,
      allowed: 'a folder that can be written to',
    });
  }
  return places.map(({ path }) => path);
}

/** Makes a folder and those above it; Node's own recursion never ends where a file system answers ENOENT, as /proc. */
async function makeFolder(folder: string): Promise<void> {
  try {
    await mkdir(folder);
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    if (code === 'EEXIST' && (await stat(folder)).isDirectory()) return;
    const parent = dirname(resolve(folder));
    if (code !== 'ENOENT' || (await exists(parent))) throw error;
    await makeFolder(parent);
    await mkdir(folder);
  }
}

const exists = (path: string) =>
  stat(path).then(
    () => true,
    () => false,
  );

async function refuseFolder(path: string): Promise<void> {
  const found = await lstat(path).catch(() => undefined);
  if (found?.isDirectory()) {
    throw new Refusal({
      path: '--out',
      value: `the folder ${showValue(path)}`,
      allowed: 'a file, or nothing, in its place',
    });
  }
}

async function writeWhole(path: string, content: Uint8Array): Promise<void> {
  const file = await open(path, 'wx');
  try {
    await file.writeFile(content);
    // On the disk before it gets its name: after a loss of power, too, there is the old file or the new one.
    await file.sync();
  } finally {
    await file.close();
  }
}
