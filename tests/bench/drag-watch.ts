/** What the watching script has written down when a drag is over. Times are performance.now(), in ms. */
export interface DragRecord {
  /** Pointer moves as they reached the page: `event.timeStamp` and height on the screen. */
  moves: { at: number; y: number }[];
  /** Definitions that the page sent to its worker, and when their answer came back. */
  jobs: { id: number; postedAt: number; amplitude: number; answeredAt: number | null }[];
  /** Frames in which the canvases of all three plots were drawn, by when the frame had been put together. */
  frames: { drawnAt: number; shownAt: number; answered: number }[];
}

/** The partial that is dragged: its amplitude tells which move a job comes from. */
export const draggedHarmonic = 3;

/**
 * Runs in the page before anything else and watches the platform, not the product: pointer events, messages to and
 * from workers, drawing on canvases, frames. A frame counts once a task queued from inside its animation callbacks
 * runs: styles, layout and painting of that frame are then behind it. Bundled by drag.ts.
 */
export function watchDrag(): void {
  const record: DragRecord = { moves: [], jobs: [], frames: [] };
  Object.assign(globalThis, { dragRecord: record });

  addEventListener(
    'pointermove',
    ({ timeStamp, clientY }) => record.moves.push({ at: timeStamp, y: clientY }),
    true,
  );

  const NativeWorker = Worker;
  globalThis.Worker = class extends NativeWorker {
    constructor(url: string | URL, options?: WorkerOptions) {
      super(url, options);
      this.addEventListener('message', ({ data }: MessageEvent<{ id?: number }>) => {
        const job = record.jobs.find(({ id }) => id === data.id);
        if (job !== undefined) job.answeredAt = performance.now();
      });
    }

    override postMessage(message: unknown): void {
      const { id, definition } = message as {
        id: number;
        definition: { source: { partials?: { harmonic: number; amplitude: number }[] } };
      };
      const amplitude =
        definition.source.partials?.find((partial) => partial.harmonic === draggedHarmonic)?.amplitude ?? 0;
      record.jobs.push({ id, postedAt: performance.now(), amplitude, answeredAt: null });
      super.postMessage(message);
    }
  };

  const drawnPlots = new Set<string>();
  let isFrameOpen = false;
  const onDraw = (canvas: unknown) => {
    if (!(canvas instanceof HTMLCanvasElement)) return;
    const title = canvas.closest('figure')?.getAttribute('aria-labelledby');
    if (title === null || title === undefined) return;
    drawnPlots.add(title);
    if (drawnPlots.size < 3 || isFrameOpen) return;
    isFrameOpen = true;
    const drawnAt = performance.now();
    const answered = record.jobs.filter((job) => job.answeredAt !== null).length;
    const afterFrame = new MessageChannel();
    afterFrame.port1.onmessage = () => {
      isFrameOpen = false;
      drawnPlots.clear();
      record.frames.push({ drawnAt, shownAt: performance.now(), answered });
    };
    afterFrame.port2.postMessage(null);
  };
  const context = CanvasRenderingContext2D.prototype;
  for (const name of ['stroke', 'fill', 'fillRect', 'clearRect'] as const) {
    const native = context[name] as (...args: unknown[]) => void;
    Object.assign(context, {
      [name](this: CanvasRenderingContext2D, ...args: unknown[]) {
        onDraw(this.canvas);
        native.apply(this, args);
      },
    });
  }
}
