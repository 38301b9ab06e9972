import { expect, type Page } from '@playwright/test';

/**
 * Watches from the test's side what a page sends to its loudspeaker: contexts made, and every frame that reaches one's
 * destination. The page itself knows nothing of it.
 */
export async function overhear(page: Page): Promise<void> {
  await page.addInitScript(() => {
    const heard = { contexts: [] as AudioContext[], blocks: [] as Float32Array[] };
    Object.assign(window, { heard });
    const RealContext = AudioContext;
    window.AudioContext = class extends RealContext {
      constructor(options?: AudioContextOptions) {
        super(options);
        heard.contexts.push(this);
      }
    };
    const connect = AudioNode.prototype.connect;
    AudioNode.prototype.connect = function (this: AudioNode, ...to: [never]) {
      const target: unknown = to[0];
      if (target instanceof AudioDestinationNode) {
        // Deprecated, but it needs no file of its own that the content policy would have to allow.
        const tap = (this.context as AudioContext).createScriptProcessor(4096, 1, 1);
        tap.onaudioprocess = ({ inputBuffer }) => heard.blocks.push(inputBuffer.getChannelData(0).slice());
        connect.call(this, tap as never);
        connect.call(tap, target as never);
      }
      return connect.apply(this, to);
    } as typeof connect;
  });
}

interface Heard {
  contexts: AudioContext[];
  blocks: Float32Array[];
}

export const heardOf = (page: Page) => ({
  contexts: () =>
    page.evaluate(() => (window as unknown as { heard: Heard }).heard.contexts.map(({ state }) => state)),
  forget: () =>
    page.evaluate(() => {
      (window as unknown as { heard: Heard }).heard.blocks.length = 0;
    }),
  frames: () =>
    page.evaluate(() => (window as unknown as { heard: Heard }).heard.blocks.flatMap((block) => [...block])),
});

export async function openListening(page: Page): Promise<void> {
  await page.goto('/');
  const tread = page.locator('#output').getByRole('button').first();
  if ((await tread.getAttribute('aria-expanded')) === 'false') await tread.click();
  await expect(page.getByRole('heading', { name: 'Listen' })).toBeVisible();
}

export const play = (page: Page) => page.getByRole('button', { name: 'Play', exact: true });
export const stop = (page: Page) =>
  page.locator('.listen').getByRole('button', { name: 'Stop', exact: true });
