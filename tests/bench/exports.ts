import type { buildTable } from '../../shared/build-table.ts';
import type { renderFiles, targets } from '../../shared/firmware/index.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';

const turns = 21;
/** Turns that only warm up. */
const coldTurns = 6;
const goalMs = 60;

/** Rendering 65,536 entries of 16 bits for every target; the AVR's arrays end at 16,383, which it is timed with. */
export async function measureExports(): Promise<boolean> {
  const load = async (path: string, name: string): Promise<unknown> =>
    import(await bundleModule(new URL(path, import.meta.url), name));
  const { buildTable: build } = (await load('../../shared/build-table.ts', 'engine')) as {
    buildTable: typeof buildTable;
  };
  const firmware = (await load('../../shared/firmware/index.ts', 'firmware')) as {
    renderFiles: typeof renderFiles;
    targets: typeof targets;
  };
  const templates = readTemplates();
  const tableOf = (length: number) =>
    build({
      schema: 1,
      name: 'measured',
      source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
      table: { length, bits: 16, coding: 'twos-complement' },
    });
  const [whole, largest] = [tableOf(65_536), tableOf(16_383)];
  return firmware.targets
    .map(({ id }) => {
      const times = Array.from({ length: turns }, () => {
        const start = performance.now();
        firmware.renderFiles(id === 'avr' ? largest : whole, id, {}, templates);
        return performance.now() - start;
      });
      return judge(`  ${id}`, median(times.slice(coldTurns)), goalMs, ' ms');
    })
    .every(Boolean);
}
