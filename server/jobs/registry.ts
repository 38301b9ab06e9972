import { buildTable } from '../../shared/build-table.ts';

/** Work done in worker threads, by name: input and result must survive structured cloning. */
export const jobs = { buildTable };
