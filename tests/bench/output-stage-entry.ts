/** What the benchmark of the output stage takes from the engine, bundled as it is shipped. */
export { buildTable } from '../../shared/build-table.ts';
export { parseLadder, parseTrialSettings } from '../../shared/contract/index.ts';
export { drawsOf, Trials, voltsOf } from '../../shared/output-stage/index.ts';
