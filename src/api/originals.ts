import { originalSchema } from '../../shared/contract/index.ts';
import { ask } from './client.ts';

/** Keeps a file with the revision that was made from it. The same bytes once more change nothing. */
export const keepOriginal = async (team: string, table: string, number: number, file: File) => {
  const [inTeam, inTable] = [encodeURIComponent(team), encodeURIComponent(table)];
  const name = new URLSearchParams({ name: file.name.slice(0, 120) });
  const path = `/teams/${inTeam}/tables/${inTable}/revisions/${number}/originals?${name}`;
  return (await ask(path, { method: 'POST', file, schema: originalSchema })).data;
};
