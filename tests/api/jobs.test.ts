import { afterEach, describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { Refusal } from '../../shared/contract/index.ts';
import { JobOverrun, JobQueueFull } from '../../server/jobs/faults.ts';
import { createJobPool, type JobPool, type JobPoolOptions } from '../../server/jobs/pool.ts';
import type { testJobs } from '../support/test-jobs.ts';

const entry = new URL('../support/jobs-worker.ts', import.meta.url);
let pool: JobPool<typeof testJobs>;
const open = (options: JobPoolOptions = {}) =>
  (pool = createJobPool<typeof testJobs>({ entry, size: 1, ...options }));
afterEach(() => pool.close());

describe('the job pool', () => {
  it('answers each caller with its own result, more jobs than workers', async () => {
    open({ size: 2 });
    const results = await Promise.all(Array.from({ length: 50 }, (_, index) => pool.run('double', index)));
    expect(results).toEqual(Array.from({ length: 50 }, (_, index) => 2 * index));
  });

  it('ends a job that takes too long; the ones waiting behind it are served', async () => {
    open({ timeLimit: 300 });
    const [spun, doubled] = await Promise.allSettled([pool.run('spin', null), pool.run('double', 4)]);
    expect(spun).toMatchObject({ status: 'rejected', reason: expect.any(JobOverrun) });
    expect(String(spun.status === 'rejected' && spun.reason)).toContain('0.3 s');
    expect(doubled).toEqual({ status: 'fulfilled', value: 8 });
  });

  it('ends a job that takes too much memory; the next one is served', async () => {
    open({ memoryLimit: 64, timeLimit: 30_000 });
    await expect(pool.run('hoard', null)).rejects.toThrow(JobOverrun);
    expect(await pool.run('double', 5)).toBe(10);
  });

  it("hands on the engine's refusals and other errors as they were", async () => {
    open();
    const refused = await pool.run('refuse', '17').catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(Refusal);
    expect(refused).toMatchObject({ problems: [{ path: 'table.bits', value: '17', allowed: 'less' }] });
    await expect(pool.run('fail', 'broken')).rejects.toMatchObject({ name: 'TypeError', message: 'broken' });
    expect(await pool.run('double', 6)).toBe(12);
  });

  it('survives whatever a job does to its worker', async () => {
    open();
    await expect(pool.run('answerNothingCloneable', null)).rejects.toThrow(/could not be cloned/);
    await expect(pool.run('leave', null)).rejects.toThrow();
    await expect(pool.run('throwLater', null)).rejects.toThrow('outside of the promise');
    await expect(pool.run('double', (() => 1) as unknown as number)).rejects.toThrow(/could not be cloned/);
    expect(await pool.run('double', 7)).toBe(14);
  });

  it('refuses to let a queue grow without end', async () => {
    open({ queueLimit: 2, timeLimit: 300 });
    const waiting = [1, 2].map(() => pool.run('spin', null).catch((error: unknown) => error));
    await expect(pool.run('double', 1)).rejects.toThrow(JobQueueFull);
    for (const outcome of await Promise.all(waiting)) expect(outcome).toBeInstanceOf(JobOverrun);
  });

  it('does not keep callers waiting for a worker that cannot start', async () => {
    open({ entry: new URL('../support/no-such-worker.ts', import.meta.url) });
    await expect(pool.run('double', 1)).rejects.toThrow(/no-such-worker/);
  });

  it('rejects what is under way and what waits when it closes', async () => {
    open();
    const outcomes = [pool.run('spin', null), pool.run('double', 1)].map((job) =>
      job.catch((error: unknown) => String(error)),
    );
    await pool.close();
    for (const outcome of await Promise.all(outcomes)) expect(outcome).toContain('closed');
    await expect(pool.run('double', 1)).rejects.toThrow('closed');
  });
});

describe("the program's own jobs", () => {
  it('build the same table in a worker as here', async () => {
    const definition = {
      schema: 1,
      name: 'fog signal',
      source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
      table: { length: 64, bits: 8 },
    };
    const own = createJobPool();
    const [there, here] = [await own.run('buildTable', definition), buildTable(definition)];
    expect(there).toEqual(here);
    await own.close();
  });
});
