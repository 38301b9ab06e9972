import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { proofsOf, renderFiles, sampleCosts, type SampleCost } from '../../shared/firmware/index.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';

const costs = sampleCosts();
const cycles = ({ found }: SampleCost) => found !== 'instructions';

describe('what a sample costs in proven playback code', () => {
  it.each([
    ['timer, 256 × 8', 256],
    ['timer-accumulator, 256 × 8', 256],
    ['two-accumulators, 256 × 8', 256],
    ['once, 100 × 8', 100],
  ])('avr %s: in all the fewest cycles between samples that the target takes', (title, length) => {
    const [cost] = costs.filter(({ id }) => id === `avr ${title}`);
    const table = buildTable({
      schema: 1,
      name: 'Wave',
      source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
      table: { length, bits: 8 },
    });
    const rendered = (compare: number) =>
      renderFiles(table, 'avr', { playback: cost.playback, compare }, readTemplates());
    expect(rendered(cost.inAll - 1)).toHaveLength(3);
    expect(() => rendered(cost.inAll - 2)).toThrow(Refusal);
    // The file counts the data sheets' response, the simulator 2 cycles fewer.
    expect(rendered(499)[2]).toHaveProperty(
      'text',
      expect.stringContaining(`takes at most ${cost.figure + 2} cycles`),
    );
  });

  it('varies at its entry by all but one of the cycles that the longest main instruction takes', () => {
    const handlers = costs.filter(({ found }) => found === 'handler cycles');
    expect(handlers.length).toBeGreaterThan(8);
    for (const { id, entryVariesBy, entryVariesWithCalls, mainCycles } of handlers) {
      expect([entryVariesBy, entryVariesWithCalls], id).toEqual([mainCycles - 1, 3]);
    }
  });

  it('adds nothing to loops and to instructions', () => {
    const others = costs.filter(({ found }) => found !== 'handler cycles');
    expect(others.length).toBeGreaterThan(20);
    for (const { inAll, figure } of others) expect(inAll).toBe(figure);
  });

  it('has every figure of the proofs once', () => {
    const withFigures = ['avr', 'cortex-m', 'riscv'].flatMap((target) =>
      proofsOf(target).flatMap((proof) => {
        const figure = proof.handlerCycles ?? proof.cyclesPerWord ?? proof.instructions;
        return figure === undefined ? [] : [[`${target} ${proof.case}`, figure]];
      }),
    );
    expect(costs.map(({ id, figure }) => [id, figure])).toEqual(withFigures);
    expect(new Set(costs.map(({ id }) => id)).size).toBe(costs.length);
  });
});

const units = {
  'loop cycles': 'cycles from word to word',
  'handler cycles': 'cycles of the handler',
  instructions: 'instructions',
};

/** A row for each target and playback: the figure of its first case, every case's by size, the worst in all. */
function rowsOf(all: readonly SampleCost[]): string[][] {
  const kinds = [...new Set(all.map(({ target, playback }) => `${target} ${playback}`))];
  return kinds.map((kind) => {
    const alike = all.filter(({ target, playback }) => `${target} ${playback}` === kind);
    const [{ target, playback, found, figure }] = alike;
    const figures = alike.map((cost) => cost.figure).sort((a, b) => a - b);
    const most = cycles(alike[0]) ? String(Math.max(...alike.map(({ inAll }) => inAll))) : '–';
    return [`\`${target}\``, `\`${playback}\``, units[found], String(figure), figures.join(', '), most];
  });
}

it('the README’s table of playback costs is what the proofs have found', () => {
  const readme = readFileSync(new URL('../../README.md', import.meta.url), 'utf8');
  const [, table = ''] = /^(\| target +\| playback[^]*?)\n\n/m.exec(readme) ?? [];
  const rows = table.split('\n').map((line) => line.split('|').slice(1, -1));
  const found = rows.slice(2).map((row) => row.map((cell) => cell.trim()));
  expect(found).toEqual(rowsOf(costs));
});
