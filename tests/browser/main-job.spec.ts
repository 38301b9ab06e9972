import { expect } from '@playwright/test';
import { buildTable } from '../../shared/build-table.ts';
import { numbersInC, strictWarnings } from '../outside/support/compilers.ts';
import { figure, flight, test, textOf } from '../support/bench-page.ts';

/** A fog-signal tone of our own: harmonic and amplitude. Phases stay those of a sine. */
const partials = [
  [1, 1],
  [2, 0.7],
  [3, 0.4],
  [5, 0.25],
  [9, 0.1],
] as const;

test('from an empty bench to a fog-signal tone in C that prints the codes', async ({ page }) => {
  await page.goto('/');
  await expect(figure(page, 'SNR')).toBeVisible();

  await page.getByRole('textbox', { name: 'Name of the wave' }).fill('Pier head fog tone');
  await page.getByRole('button', { name: 'Sine', exact: true }).click();
  for (const [harmonic, amplitude] of partials) {
    await page.getByRole('slider', { name: `Harmonic ${harmonic}`, exact: true }).focus();
    await page.keyboard.type(String(amplitude));
    await page.keyboard.press('Enter');
  }
  await expect(page.getByText('5 partials', { exact: true })).toBeVisible();

  // Heard: the context runs, and the analyser's five strongest lines are the partials.
  await flight(page, 'Output').click();
  await page.getByRole('textbox', { name: 'Tone' }).fill('330');
  await page.getByRole('button', { name: 'Play', exact: true }).click();
  await expect(page.getByText('Playing the quantised table as a loop.')).toBeVisible();
  const lines = page.getByRole('table', { name: /Strongest lines/ }).locator('tbody tr');
  await expect(lines).toHaveCount(5);
  await expect(async () => {
    const heard = await lines.evaluateAll((rows) =>
      rows.map((row) =>
        [...row.querySelectorAll('td')].map((cell) => (cell.textContent ?? '').replace('−', '-')),
      ),
    );
    heard.forEach(([frequency, level], rank) => {
      const [harmonic, amplitude] = partials[rank];
      const hz = parseFloat(frequency) * (frequency.includes('kHz') ? 1000 : 1);
      expect(Math.abs(hz - 330 * harmonic)).toBeLessThan(2);
      expect(Math.abs(parseFloat(level) - 20 * Math.log10(amplitude))).toBeLessThan(1);
    });
  }).toPass({ timeout: 10_000 });
  await page.locator('.listen').getByRole('button', { name: 'Stop', exact: true }).click();

  // Exported: what gcc makes of the files are the codes of the same definition, built here.
  await flight(page, 'Export').click();
  const files: { name: string; text: string }[] = [];
  for (const name of ['pier_head_fog_tone.h', 'pier_head_fog_tone.c']) {
    await page.getByRole('tab', { name }).click();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: `Download ${name}` }).click(),
    ]);
    files.push({ name, text: await textOf(download) });
  }
  const numbers = await numbersInC(files, 'pier_head_fog_tone', ['-std=c99', ...strictWarnings]);
  const { codes } = buildTable({
    schema: 1,
    name: 'Pier head fog tone',
    source: {
      kind: 'harmonics',
      partials: partials.map(([harmonic, amplitude]) => ({ harmonic, amplitude, phaseDeg: 0 })),
    },
  });
  expect(numbers).toEqual([...codes]);
});
