import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { z } from 'zod';
import { projectFolder } from '../project-folder.ts';

/** One migration as generated: its name, its statements in order and the SHA-256 of its file. */
export interface Migration {
  readonly tag: string;
  readonly when: number;
  readonly hash: string;
  readonly statements: readonly string[];
}

const journalSchema = z.object({ entries: z.array(z.object({ tag: z.string(), when: z.number() })) });

export const migrationsFolder = join(projectFolder, 'drizzle');

/** Reads the migrations that belong to this version of the program, oldest first. */
export function readJournal(folder = migrationsFolder): Migration[] {
  const { entries } = journalSchema.parse(
    JSON.parse(readFileSync(join(folder, 'meta', '_journal.json'), 'utf8')),
  );
  return entries.map(({ tag, when }) => {
    const text = readFileSync(join(folder, `${tag}.sql`), 'utf8');
    return {
      tag,
      when,
      hash: createHash('sha256').update(text).digest('hex'),
      statements: text
        .split('--> statement-breakpoint')
        .map((statement) => statement.trim())
        .filter(Boolean),
    };
  });
}
