import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Definition } from '../../shared/contract/index.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { createEngine, type EnginePort } from '../../src/workers/engine-client.ts';
import type { EngineJob, EngineReply } from '../../src/workers/engine-messages.ts';

/** A worker whose pace the test sets: it refuses each job by name when told to. */
class SlowPort implements EnginePort {
  onmessage: EnginePort['onmessage'] = null;
  onerror: EnginePort['onerror'] = null;
  isEnded = false;
  readonly jobs: EngineJob[] = [];
  postMessage(job: EngineJob) {
    this.jobs.push(job);
  }
  terminate() {
    this.isEnded = true;
  }
  finish() {
    const { id, definition } = this.jobs[this.jobs.length - 1];
    const problems = [{ path: 'name', value: definition.name, allowed: 'another' }];
    this.onmessage?.({ data: { id, kind: 'refused', problems } } as MessageEvent);
  }
  crash(message: string) {
    this.onerror?.({ message, preventDefault: () => undefined } as ErrorEvent);
  }
}

const named = (name: string): Definition => ({ ...examples[0].work.definition, name });

function setUp() {
  const ports: SlowPort[] = [];
  const replies: [EngineReply['kind'], string][] = [];
  const engine = createEngine(
    (reply, { name }) => replies.push([reply.kind, name]),
    () => {
      const port = new SlowPort();
      ports.push(port);
      return port;
    },
  );
  const namesSent = () => ports.map(({ jobs }) => jobs.map(({ definition }) => definition.name));
  return { engine, ports, replies, namesSent };
}

describe('the engine’s client', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('lets one request wait at most, the newest', () => {
    const { engine, ports, replies, namesSent } = setUp();
    for (const name of ['a', 'b', 'c', 'd']) engine.submit(named(name));
    expect(namesSent()).toEqual([['a']]);
    ports[0].finish();
    ports[0].finish();
    expect(namesSent()).toEqual([['a', 'd']]);
    expect(replies).toEqual([
      ['refused', 'a'],
      ['refused', 'd'],
    ]);
  });

  it('answers a crash, and builds what waits in a new worker', () => {
    const { engine, ports, replies, namesSent } = setUp();
    engine.submit(named('a'));
    engine.submit(named('b'));
    ports[0].crash('out of memory');
    expect(ports[0].isEnded).toBe(true);
    expect(namesSent()).toEqual([['a'], ['b']]);
    ports[1].finish();
    expect(replies).toEqual([
      ['failed', 'a'],
      ['refused', 'b'],
    ]);
  });

  it('starts anew for the next request after a crash with nothing to do', () => {
    const { engine, ports, replies } = setUp();
    engine.submit(named('a'));
    ports[0].finish();
    ports[0].crash('late');
    engine.submit(named('b'));
    expect(ports).toHaveLength(2);
    ports[1].finish();
    expect(replies.at(-1)).toEqual(['refused', 'b']);
  });

  it('gives a build that hangs up for a newer one after two seconds', () => {
    const { engine, ports, replies, namesSent } = setUp();
    engine.submit(named('a'));
    vi.advanceTimersByTime(1_900);
    engine.submit(named('b'));
    vi.advanceTimersByTime(99);
    expect(ports).toHaveLength(1);
    vi.advanceTimersByTime(1);
    expect(ports[0].isEnded).toBe(true);
    expect(namesSent()).toEqual([['a'], ['b']]);
    ports[1].finish();
    expect(replies).toEqual([['refused', 'b']]);
  });

  it('gives a build that hangs up in any case after twenty seconds', () => {
    const { engine, ports, replies } = setUp();
    engine.submit(named('a'));
    vi.advanceTimersByTime(19_999);
    expect(replies).toEqual([]);
    vi.advanceTimersByTime(1);
    expect(replies).toEqual([['failed', 'a']]);
    expect(ports[0].isEnded).toBe(true);
  });

  it('hears nothing more once stopped', () => {
    const { engine, ports, replies } = setUp();
    engine.submit(named('a'));
    engine.submit(named('b'));
    engine.stop();
    ports[0].finish();
    vi.advanceTimersByTime(60_000);
    expect(replies).toEqual([]);
    expect(ports).toHaveLength(1);
  });
});
