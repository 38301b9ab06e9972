import { expect, test } from '@playwright/test';
import { heardOf, overhear, play } from '../support/listening.ts';

// A trace looks into the page at every step, which counts as a gesture of its visitor.
test.use({ trace: 'off' });

test('says so where the browser keeps the sound back', async ({ playwright }, { project }) => {
  // The policy that people's browsers have: a page may sound from its visitor's first gesture on.
  const { launchOptions, baseURL } = project.use;
  const args = [...(launchOptions?.args ?? []), '--autoplay-policy=document-user-activation-required'];
  const browser = await playwright.chromium.launch({ ...launchOptions, args });
  const page = await browser.newPage({ baseURL });
  await overhear(page);
  // Clicks by a script of the page are no gesture, so the browser leaves the context suspended.
  await page.addInitScript(() => {
    const timer = setInterval(() => {
      document.querySelector<HTMLElement>('#output [aria-expanded=false]')?.click();
      const button = [...document.querySelectorAll('button')].find(
        ({ textContent }) => textContent === 'Play',
      );
      if (button === undefined) return;
      button.click();
      console.debug('pressed');
      clearInterval(timer);
    }, 100);
  });
  const pressed = page.waitForEvent('console', (message) => message.text() === 'pressed');
  await page.goto('/');
  await pressed;
  // Asking the page anything through the test's own door would count as a gesture.
  await page.waitForTimeout(3_000);
  await expect(page.getByText('The browser has not started its audio')).toBeVisible({ timeout: 6_000 });
  expect(await heardOf(page).contexts()).toEqual(['suspended']);
  await expect(play(page)).toBeVisible();
  await browser.close();
});

test('says so where plain http keeps the audio worklet away', async ({ page, baseURL }) => {
  // A name that is not this machine's own: over plain http the browser does not trust the page that far.
  await page.route('http://bench.example/**', async (route) => {
    const { pathname, search } = new URL(route.request().url());
    const response = await route.fetch({ url: new URL(pathname + search, baseURL).href });
    await route.fulfill({ response });
  });
  await page.goto('http://bench.example/?open=output');
  await play(page).click();
  await expect(page.getByText('Over plain http the browser keeps its audio worklet away')).toBeVisible();
  await expect(play(page)).toBeVisible();
});
