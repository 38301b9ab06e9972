// What the benchmark of sizes and accumulators bundles, as the product ships it.
export { buildTable } from '../../shared/build-table.ts';
export { parseDefinition } from '../../shared/contract/index.ts';
export { analyseAccumulator, strongestLines } from '../../shared/playback/index.ts';
export { sizeSearch, usualAxes } from '../../shared/size-search/index.ts';
