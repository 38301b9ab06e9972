import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { inFolder, run } from './programs.ts';

/** What a circuit simulation found: each vector by its name, `v(out)`, `time`, `frequency`; magnitudes where complex. */
export type SpiceVectors = ReadonlyMap<string, Float64Array>;

/**
 * Runs one analysis of a circuit in ngspice (Debian's, batch mode) and reads back every node.
 *
 * @param elements lines of the circuit, without title and end
 * @param analysis `op`, `ac dec 10 10 1k`, `tran 1u 1m 0 1u`
 * @param nodes names of the nodes to read
 */
export async function simulate(
  elements: readonly string[],
  analysis: string,
  nodes: readonly string[],
): Promise<SpiceVectors> {
  const circuit = [
    'circuit',
    ...elements,
    '.options reltol=1e-7 vntol=1e-9 abstol=1e-15 numdgt=15',
    '.control',
    'set filetype=ascii',
    ...(nodes.length > 0 ? [`save ${nodes.map((node) => `v(${node})`).join('\n+ ')}`] : []),
    analysis,
    'write answer.raw',
    // Batch mode would go on to look for analyses outside the control block.
    'quit 0',
    '.endc',
    '.end',
    '',
  ];
  return inFolder([{ name: 'circuit.cir', text: circuit.join('\n') }], async (folder) => {
    await run('ngspice', ['-b', 'circuit.cir'], folder);
    return readRaw(await readFile(join(folder, 'answer.raw'), 'utf8'));
  });
}

/** ngspice's own ASCII file: a head, the names of the vectors, then one value a line, point by point. */
function readRaw(text: string): SpiceVectors {
  const lines = text.split('\n');
  const numberAfter = (label: string) =>
    Number(lines.find((line) => line.startsWith(label))?.slice(label.length));
  const count = numberAfter('No. Variables:');
  const points = numberAfter('No. Points:');
  const namesAt = lines.indexOf('Variables:') + 1;
  const names = lines.slice(namesAt, namesAt + count).map((line) => line.trim().split(/\s+/)[1]);
  const vectors = names.map(() => new Float64Array(points));
  const values = lines
    .slice(lines.indexOf('Values:') + 1)
    .map((line) => line.trim())
    .filter((line) => line !== '');
  values.forEach((line, index) => {
    const [re, im] = (line.split(/\s+/).at(-1) as string).split(',').map(Number);
    vectors[index % count][Math.floor(index / count)] = im === undefined ? re : Math.hypot(re, im);
  });
  if (values.length !== count * points || !vectors.every((vector) => vector.every(Number.isFinite)))
    throw new Error(`ngspice wrote ${values.length} values, ${count * points} were to come.`);
  return new Map(names.map((name, index) => [name, vectors[index]]));
}

export function vectorOf(vectors: SpiceVectors, name: string): Float64Array {
  const vector = vectors.get(name);
  if (vector === undefined)
    throw new Error(`ngspice has no ${name}; it has ${[...vectors.keys()].join(', ')}`);
  return vector;
}

/** Value at a time between the points of a simulation, on the straight line between the two. */
export function valueAt(times: Float64Array, values: Float64Array, time: number): number {
  let low = 0;
  let high = times.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle] <= time) low = middle;
    else high = middle;
  }
  const share = (time - times[low]) / (times[high] - times[low]);
  return values[low] + share * (values[high] - values[low]);
}
