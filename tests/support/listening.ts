import { expect, type Page } from '@playwright/test';

/** Runs of frames that a page sent to its loudspeaker, and where on its context's clock each begins. */
interface Block {
  readonly frame: number;
  readonly frames: Float32Array;
}

/** Something the visitor did, and what frame the last context was at; -1 before there is one. */
export interface Mark {
  readonly type: string;
  readonly frame: number;
}

interface Heard {
  readonly contexts: AudioContext[];
  blocks: Block[];
  marks: Mark[];
}

/**
 * Watches from the test's side what a page sends to its loudspeaker: contexts made, and every frame that reaches one's
 * destination, by a worklet of the test's own. The page itself knows nothing of it.
 */
export async function overhear(page: Page): Promise<void> {
  // The test's worklet is no file of the page's origin, which is all that its content policy lets in.
  const session = await page.context().newCDPSession(page);
  await session.send('Page.setBypassCSP', { enabled: true });
  await page.addInitScript(() => {
    const heard: Heard = { contexts: [], blocks: [], marks: [] };
    Object.assign(window, { heard });
    const tap = `registerProcessor('tap', class extends AudioWorkletProcessor {
      frames = new Float32Array(1024); count = 0;
      process([[input]], [[out]]) {
        if (this.count === 0) this.frame = currentFrame;
        if (input) this.frames.set(input, this.count);
        this.count += out.length;
        if (this.count === this.frames.length) {
          this.port.postMessage({ frame: this.frame, frames: this.frames });
          this.frames = new Float32Array(1024); this.count = 0;
        }
        return true;
      }
    });`;
    const RealContext = AudioContext;
    window.AudioContext = class extends RealContext {
      constructor(options?: AudioContextOptions) {
        super(options);
        heard.contexts.push(this);
      }
    };
    const { connect } = AudioNode.prototype;
    const outputs = new WeakMap<AudioWorklet, () => void>();
    const loaded = new WeakSet<AudioWorklet>();
    /** Once there are both an output and the module, however often either is asked for. */
    const tapOnce = (worklet: AudioWorklet) => {
      const make = outputs.get(worklet);
      if (make === undefined || !loaded.has(worklet)) return;
      outputs.delete(worklet);
      make();
    };
    AudioNode.prototype.connect = function (this: AudioNode, ...to: [never]) {
      const target: unknown = to[0];
      const { audioWorklet } = this.context as { audioWorklet?: AudioWorklet };
      if (target instanceof AudioDestinationNode && audioWorklet !== undefined) {
        outputs.set(audioWorklet, () => {
          const node = new AudioWorkletNode(this.context, 'tap', { outputChannelCount: [1] });
          node.port.onmessage = ({ data }: MessageEvent<Block>) => {
            heard.blocks.push(data);
          };
          connect.call(this, node as never);
          connect.call(node, target as never);
        });
        tapOnce(audioWorklet);
      }
      return connect.apply(this, to);
    } as typeof connect;
    // Comes with the page's own module, so that the page waits for one and not for two.
    const { addModule } = Worklet.prototype;
    Worklet.prototype.addModule = async function (url, options) {
      const both = `import ${JSON.stringify(new URL(url, document.baseURI).href)};${tap}`;
      await addModule.call(this, URL.createObjectURL(new Blob([both], { type: 'text/javascript' })), options);
      loaded.add(this as AudioWorklet);
      tapOnce(this as AudioWorklet);
    };
    const mark = ({ type }: Event) => {
      const context = heard.contexts.at(-1);
      const frame = context === undefined ? -1 : Math.round(context.currentTime * context.sampleRate);
      heard.marks.push({ type, frame });
    };
    for (const type of ['click', 'keydown', 'input']) addEventListener(type, mark, { capture: true });
  });
}

interface HeardWindow {
  readonly heard: Heard;
}

export const heardOf = (page: Page) => ({
  contexts: () =>
    page.evaluate(() => (window as unknown as HeardWindow).heard.contexts.map(({ state }) => state)),
  /** In hertz, one a context. */
  rates: () =>
    page.evaluate(() =>
      (window as unknown as HeardWindow).heard.contexts.map(({ sampleRate }) => sampleRate),
    ),
  forget: () =>
    page.evaluate(() => {
      Object.assign((window as unknown as HeardWindow).heard, { blocks: [], marks: [] });
    }),
  frames: async () => {
    const all = await page.evaluate(() => {
      const { blocks } = (window as unknown as HeardWindow).heard;
      const whole = new Float32Array(blocks.reduce((sum, { frames }) => sum + frames.length, 0));
      let at = 0;
      for (const { frames } of blocks) {
        whole.set(frames, at);
        at += frames.length;
      }
      return whole;
    });
    return Array.from(all);
  },
  /** On the last context's clock, of the first of `frames`. */
  firstFrame: () => page.evaluate(() => (window as unknown as HeardWindow).heard.blocks.at(0)?.frame ?? 0),
  marks: () => page.evaluate(() => (window as unknown as HeardWindow).heard.marks),
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
