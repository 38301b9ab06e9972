import { describe, expect, it, vi } from 'vitest';
import { tabulate } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { createBench } from '../../src/features/bench/state/bench.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { createKeep, readKept, storageKeys, writeKept } from '../../src/features/bench/state/storage.ts';
import type { Work } from '../../src/features/bench/state/wave.ts';
import type { EnginePort } from '../../src/workers/engine-client.ts';
import type { EngineJob, TableAnswer } from '../../src/workers/engine-messages.ts';

/** The real engine, on this thread, one turn later. */
function engineHere(): EnginePort {
  const port: EnginePort = {
    onmessage: null,
    onerror: null,
    terminate: () => undefined,
    postMessage({ id, definition }: EngineJob) {
      queueMicrotask(() => {
        try {
          const table = tabulate(definition) as TableAnswer;
          port.onmessage?.({ data: { id, kind: 'built', table } } as MessageEvent);
        } catch (error) {
          if (!(error instanceof Refusal)) throw error;
          port.onmessage?.({ data: { id, kind: 'refused', problems: error.problems } } as MessageEvent);
        }
      });
    },
  };
  return port;
}

/** Two tabs' worth of browser: one storage, whose changes each tab hears from the others only. */
function browser(entries: Record<string, string> = {}) {
  const held = new Map(Object.entries(entries));
  const tabs: { target: EventTarget; storage: Pick<Storage, 'getItem' | 'setItem' | 'removeItem'> }[] = [];
  const openTab = () => {
    const target = new EventTarget();
    const tell = (key: string, newValue: string | null) => {
      for (const other of tabs) {
        if (other.target === target) continue;
        const event = Object.assign(new Event('storage'), { key, newValue, storageArea: other.storage });
        other.target.dispatchEvent(event);
      }
    };
    const storage = {
      getItem: (key: string) => held.get(key) ?? null,
      setItem: (key: string, text: string) => (held.set(key, text), tell(key, text)),
      removeItem: (key: string) => (held.delete(key), tell(key, null)),
    };
    tabs.push({ target, storage });
    return createBench({
      keep: createKeep(storage, target as unknown as Window),
      startEngine: engineHere,
      now: () => 0,
    });
  };
  return { held, openTab };
}

const setBits =
  (bits: number) =>
  (work: Work): Work => ({
    ...work,
    definition: { ...work.definition, table: { ...work.definition.table, bits } },
  });

const built = () => new Promise<void>((resolve) => setTimeout(resolve, 0));
const bitsOf = ({ definition }: Work) => definition.table.bits;

describe('the bench', () => {
  it('opens with the first example, built', async () => {
    const bench = browser().openTab();
    expect(bench.getState()).toMatchObject({ isUntouched: true, table: null, isBuilding: true });
    await built();
    const { table, history, problems, isBuilding } = bench.getState();
    expect(table?.codes).toEqual(tabulate(history.present.definition).codes);
    expect({ problems, isBuilding }).toEqual({ problems: [], isBuilding: false });
  });

  it('keeps a refused draft as typed, names the field and leaves the last table standing', async () => {
    const bench = browser().openTab();
    await built();
    const { table } = bench.getState();
    bench.change(setBits(17));
    await built();
    expect(bench.getState().table).toBe(table);
    expect(bitsOf(bench.getState().history.present)).toBe(17);
    expect(bench.getState().problems).toEqual([
      { path: 'table.bits', value: '17', allowed: 'a whole number from 1 to 16' },
    ]);
    bench.change(setBits(12));
    await built();
    expect(bench.getState().problems).toEqual([]);
    expect(bench.getState().table?.definition.table.bits).toBe(12);
  });

  it('shows what the engine refuses only after it has seen the signal', async () => {
    const bench = browser().openTab();
    bench.change((work) => ({
      ...work,
      definition: {
        ...work.definition,
        source: {
          kind: 'harmonics',
          offset: 0,
          partials: [
            { harmonic: 1, amplitude: 1, phaseDeg: 0 },
            { harmonic: 1, amplitude: -1, phaseDeg: 0 },
          ],
        },
      },
    }));
    await built();
    expect(bench.getState().problems).toMatchObject([{ path: 'source', value: 'a zero signal' }]);
    bench.undo();
    await built();
    expect(bench.getState().problems).toEqual([]);
  });

  it('takes a change that changes nothing for no step', () => {
    const bench = browser().openTab();
    bench.change(setBits(8));
    expect(bench.getState()).toMatchObject({ isUntouched: true, history: { past: [] } });
  });

  it('survives a reload, problems and all', () => {
    const { openTab } = browser();
    const bench = openTab();
    bench.change(setBits(17));
    bench.keepNow();
    expect(bitsOf(openTab().getState().history.present)).toBe(17);
  });

  it('goes on with a step while a pointer is held, though the focus moves', () => {
    const bench = browser().openTab();
    bench.hold();
    for (const bits of [9, 10, 11]) {
      bench.change(setBits(bits), { coalesce: 'drag' });
      bench.seal();
    }
    bench.release();
    expect(bench.getState().history.past).toHaveLength(1);
    bench.change(setBits(12), { coalesce: 'drag' });
    bench.seal();
    bench.change(setBits(13), { coalesce: 'drag' });
    expect(bench.getState().history.past).toHaveLength(3);
  });

  it('writes nothing while a pointer is held, and soon after it is let go', () => {
    vi.useFakeTimers();
    try {
      const { held, openTab } = browser();
      const bench = openTab();
      bench.hold();
      bench.change(setBits(9), { coalesce: 'drag' });
      vi.advanceTimersByTime(5_000);
      expect([...held]).toEqual([]);
      bench.release();
      vi.advanceTimersByTime(300);
      expect(held.get(storageKeys.bench)).toContain('"bits":9');
    } finally {
      vi.useRealTimers();
    }
  });

  it('writes nothing before something has been changed', () => {
    const { held, openTab } = browser();
    openTab().keepNow();
    expect([...held]).toEqual([]);
  });

  it('shows the other tab’s newer work as one step, and takes this tab’s own back', () => {
    const { openTab } = browser();
    const [here, there] = [openTab(), openTab()];
    here.change(setBits(5));
    here.keepNow();
    for (const bits of [6, 7, 9]) {
      there.change(setBits(bits));
      there.keepNow();
    }
    expect(here.getState()).toMatchObject({ isFromOtherTab: true });
    expect(bitsOf(here.getState().history.present)).toBe(9);
    here.undo();
    expect(bitsOf(here.getState().history.present)).toBe(5);
    here.keepNow();
    expect(bitsOf(there.getState().history.present)).toBe(5);
    there.undo();
    expect(bitsOf(there.getState().history.present)).toBe(9);
  });

  it('does not echo the other tab’s work back', () => {
    const { held, openTab } = browser();
    const [here, there] = [openTab(), openTab()];
    there.change(setBits(9));
    there.keepNow();
    const text = held.get(storageKeys.bench);
    held.set(storageKeys.bench, 'newer still');
    here.keepNow();
    expect(held.get(storageKeys.bench)).toBe('newer still');
    expect(readKept(text ?? null)).toMatchObject({ kind: 'work' });
  });

  it('begins with the example over damaged storage and hands the text out', () => {
    const { held, openTab } = browser({ [storageKeys.bench]: writeKept(examples[1].work).slice(0, -9) });
    const bench = openTab();
    expect(bench.getState().history.present).toBe(examples[0].work);
    expect(bench.getState().setAside).toBe(writeKept(examples[1].work).slice(0, -9));
    bench.letSetAsideGo();
    expect([...held]).toEqual([]);
  });

  it('builds every example', () => {
    for (const { work } of examples) expect(tabulate(work.definition).warnings).toEqual([]);
  });
});
