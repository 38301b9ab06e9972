import { buildTable } from '../../shared/build-table.ts';
import { renderDefinition, reportDefinition } from '../features/rendering/jobs.ts';
import { buildRevision } from '../features/tables/build-revision.ts';
import { renderRevision } from '../features/tables/render-revision.ts';
import { inspectUpload } from '../features/uploads/inspect.ts';

/** Work done in worker threads, by name: input and result must survive structured cloning. */
export const jobs = {
  buildTable,
  buildRevision,
  renderRevision,
  reportDefinition,
  renderDefinition,
  inspectUpload,
};
