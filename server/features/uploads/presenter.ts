import type { Original } from '../../../shared/contract/index.ts';
import { presentPerson } from '../../auth/present-person.ts';
import type { UploadRow } from './queries.ts';

export const presentUpload = (row: UploadRow): Original => ({
  id: row.id,
  name: row.name,
  kind: row.kind,
  bytes: row.bytes,
  sha256: row.sha256,
  keptBy: presentPerson(row.keptById, row.keptByName),
  keptAt: row.keptAt.toISOString(),
});
