import { setTimeout as delay } from 'node:timers/promises';
import type { Browser, Page } from '@playwright/test';
import { drawings, field } from '../support/bench-page.ts';
import { bundleModule } from './bundle-module.ts';
import { draggedHarmonic, type DragRecord } from './drag-watch.ts';
import { judge, quantile } from './judge.ts';

const tableLength = 4096;
const moves = 240;
const msBetweenMoves = 1000 / 60;
/** Moves at the start that only warm the page up. */
const coldMoves = 40;

/**
 * From a pointer move over a harmonic's bar to the frame that shows all three plots of the table it makes. A move
 * that a newer one overtook is counted until the frame of the newer one.
 */
export async function measureDrag(address: string, browser: Browser): Promise<boolean> {
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
  try {
    await page.addInitScript({
      path: await bundleModule(new URL('./drag-watch-page.ts', import.meta.url), 'drag-watch'),
    });
    await page.goto(`${address}?open=quantise`);
    await field(page, 'Table length').fill(String(tableLength));
    await field(page, 'Table length').press('Tab');
    await drawings(page).getByText('4,096').first().waitFor();
    // What was made survives a reload, and the bars are there.
    await page.goto(address);
    await drawings(page).getByText('4,096').first().waitFor();

    const spans = spansIn(await dragOverBar(page));
    if (spans.length < moves / 2) throw new Error(`Only ${spans.length} of ${moves} moves led to a frame.`);
    for (const step of steps) {
      const [p50, p95, most] = [0.5, 0.95, 1].map((share) =>
        quantile(
          spans.map((span) => span[step]),
          share,
        ).toFixed(1),
      );
      console.log(`  ${step}: p50 ${p50} ms, p95 ${p95} ms, most ${most} ms`);
    }
    const p95 = quantile(
      spans.map(({ whole }) => whole),
      0.95,
    );
    return judge('drag to frame at 4096 entries, p95', p95, 34, ' ms');
  } finally {
    await page.close();
  }
}

/** Two slow moves to learn how height becomes amplitude, then a steady to and fro at 60 moves a second. */
async function dragOverBar(page: Page): Promise<{ record: DragRecord; slowMoves: number }> {
  const bar = await page.locator(`[data-harmonic="${draggedHarmonic}"]`).first().boundingBox();
  const plane = await page
    .getByRole('group', { name: 'Harmonics as bars' })
    .locator('.bar-scroll')
    .boundingBox();
  if (bar === null || plane === null) throw new Error('The bars are not in sight.');
  const x = bar.x + bar.width / 2;
  const heightAt = (share: number) => Math.round(plane.y + plane.height * share);

  await page.mouse.move(x, heightAt(0.4));
  await page.mouse.down();
  for (const share of [0.15, 0.45]) {
    await page.mouse.move(x, heightAt(share));
    await delay(400);
  }
  const slowMoves = await page.evaluate(
    () => (globalThis as unknown as { dragRecord: DragRecord }).dragRecord.moves.length,
  );
  let due = performance.now();
  for (let i = 0; i < moves; i += 1) {
    due += msBetweenMoves;
    const phase = (i % 40) / 40;
    await page.mouse.move(x, heightAt(0.12 + 0.33 * Math.abs(2 * phase - 1)));
    await delay(Math.max(0, due - performance.now()));
  }
  await delay(500);
  await page.mouse.up();
  const record = await page.evaluate(() => (globalThis as unknown as { dragRecord: DragRecord }).dragRecord);
  return { record, slowMoves };
}

const steps = ['to the worker', 'in the worker', 'to the drawing', 'to the frame', 'whole'] as const;
type Spans = Record<(typeof steps)[number], number>;

function spansIn({ record, slowMoves }: { record: DragRecord; slowMoves: number }): Spans[] {
  const { moves: seen, jobs, frames } = record;
  const amplitudeOf = lineThrough(record, slowMoves);
  /** The move a job was made from: of those before it, the newest one that fits its amplitude best. */
  const moveOf = jobs.map(({ postedAt, amplitude }) => {
    let best = -1;
    seen.forEach(({ at, y }, i) => {
      if (at > postedAt || i < slowMoves) return;
      const isCloser =
        best < 0 ||
        Math.abs(amplitudeOf(y) - amplitude) <= Math.abs(amplitudeOf(seen[best].y) - amplitude) + 1e-9;
      if (postedAt - at < 300 && isCloser) best = i;
    });
    return best;
  });
  const spans: Spans[] = [];
  for (let i = slowMoves + coldMoves; i < seen.length; i += 1) {
    const job = jobs.find(({ answeredAt }, j) => answeredAt !== null && moveOf[j] >= i);
    const answeredAt = job?.answeredAt ?? Infinity;
    const frame = frames.find(({ drawnAt }) => drawnAt >= answeredAt);
    if (job === undefined || frame === undefined) continue;
    spans.push({
      'to the worker': job.postedAt - seen[i].at,
      'in the worker': answeredAt - job.postedAt,
      'to the drawing': frame.drawnAt - answeredAt,
      'to the frame': frame.shownAt - frame.drawnAt,
      whole: frame.shownAt - seen[i].at,
    });
  }
  return spans;
}

/** Amplitude by height, a straight line through the two slow moves and what the last job after each asked for. */
function lineThrough({ moves: seen, jobs }: DragRecord, slowMoves: number): (y: number) => number {
  const [before, after] = [seen[slowMoves - 2], seen[slowMoves - 1]];
  const askedAfter = (from: number, to: number) =>
    jobs.filter(({ postedAt }) => postedAt >= from && postedAt < to).at(-1)?.amplitude ?? NaN;
  const low = askedAfter(before.at, after.at);
  const high = askedAfter(after.at, seen[slowMoves]?.at ?? Infinity);
  const slope = (high - low) / (after.y - before.y);
  if (!Number.isFinite(slope) || slope === 0) throw new Error('The bar did not follow the pointer.');
  return (y) => low + slope * (y - before.y);
}
