import type { Definition } from '../../shared/contract/index.ts';
import type { EngineJob, EngineMessage, EngineReply } from './engine-messages.ts';

/** What the client needs of a worker. */
export interface EnginePort {
  postMessage(job: EngineJob): void;
  onmessage: ((event: MessageEvent<EngineMessage>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
  terminate(): void;
}

export interface Engine {
  /** Asks for a table. At most one other request waits: a newer one takes its place. */
  submit(definition: Definition): void;
  stop(): void;
}

/** Longest build in milliseconds: while a newer definition waits, and in any case. */
const patience = { overtaken: 2_000, alone: 20_000 } as const;

export function startEngineWorker(): EnginePort {
  return new Worker(new URL('./engine.worker.ts', import.meta.url), { type: 'module', name: 'engine' });
}

/**
 * Builds definitions one after the other off the main thread. Replies come in the order of the requests, so each is
 * the newest yet; a request that a newer one overtook gets none. A worker that breaks or hangs is ended, what it was
 * building is answered as failed, and the next request starts another.
 */
export function createEngine(
  onReply: (reply: EngineReply, definition: Definition) => void,
  start: () => EnginePort = startEngineWorker,
): Engine {
  let port: EnginePort | null = null;
  let building: EngineJob | null = null;
  let startedAt = 0;
  let waiting: EngineJob | null = null;
  let lastId = 0;
  let alarm: ReturnType<typeof setTimeout> | undefined;

  function buildNext(): void {
    building = waiting;
    waiting = null;
    clearTimeout(alarm);
    if (building === null) return;
    port ??= open();
    startedAt = performance.now();
    port.postMessage(building);
    setAlarm();
  }

  function setAlarm(): void {
    const longest = waiting === null ? patience.alone : patience.overtaken;
    clearTimeout(alarm);
    alarm = setTimeout(hangs, Math.max(0, startedAt + longest - performance.now()));
  }

  function hangs(): void {
    if (waiting === null) return fail('it took too long');
    close();
    buildNext();
  }

  function open(): EnginePort {
    const opened = start();
    opened.onmessage = ({ data }) => {
      const built = building;
      buildNext();
      if (built?.id !== data.id) return;
      const { definition } = built;
      onReply(data.kind === 'built' ? { ...data, table: { ...data.table, definition } } : data, definition);
    };
    opened.onerror = (event) => {
      event.preventDefault();
      fail(event.message || 'its program could not be loaded');
    };
    return opened;
  }

  function fail(why: string): void {
    const failed = building;
    close();
    buildNext();
    if (failed === null) return;
    const message = `The engine could not build the table: ${why}.`;
    onReply({ kind: 'failed', message }, failed.definition);
  }

  function close(): void {
    if (port === null) return;
    port.onmessage = null;
    port.onerror = null;
    port.terminate();
    port = null;
  }

  return {
    submit(definition) {
      waiting = { id: (lastId += 1), definition };
      if (building === null) buildNext();
      else setAlarm();
    },
    stop() {
      clearTimeout(alarm);
      close();
      building = null;
      waiting = null;
    },
  };
}
