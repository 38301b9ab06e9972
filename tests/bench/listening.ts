import process from 'node:process';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { Drive, Voice } from '../../shared/listening/index.ts';
import type { StageParts } from '../../shared/output-stage/index.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';
import type * as listeningEntry from './listening-entry.ts';

type Engine = typeof listeningEntry;

const rateHz = 48_000;
/** Frames that a browser asks for at a time. */
const quantum = 128;
const seconds = 6;
const goals = { heaviestShare: 15, unheardShare: 3, roundShare: 1, makingMs: 8, predictingMs: 8 };

/** An op-amp and a second-order filter behind the pin: four poles, the longest kernel. */
const stage: StageParts = {
  outputOhms: 10_000,
  capacitanceF: 1e-9,
  opAmp: { slewRateVPerS: 1e6, gainBandwidthHz: 1e6 },
  filter: { kind: 'butterworth', cutoffHz: 8000 },
};

/**
 * What listening takes of the audio thread, in per cent of one core by the processor's clock, so that other work on the
 * machine does not count; and how long making what is played takes.
 */
export async function measureListening(): Promise<boolean> {
  const bundle = await bundleModule(new URL('listening-entry.ts', import.meta.url), 'listening');
  const engine = (await import(bundle)) as Engine;
  return [measurePins(engine), measureRounds(engine), measureMaking(engine)].every(Boolean);
}

/** No two entries in a row alike, whatever the step. */
function roughValues(length: number): Float64Array {
  const generator = xoroshiro128plus(20_261_201);
  return Float64Array.from({ length }, () => generator.next() / 2 ** 31);
}

const accumulatorAt = (sampleRateHz: number): Drive => ({
  kind: 'accumulator',
  sampleRateHz,
  accumulatorBits: 48,
  stepWord: Math.round(0.123_456_789 * 2 ** 48),
});

function measurePins({ PinPlayer, stepKernel }: Engine): boolean {
  const playing = (sampleRateHz: number) => {
    const player = new PinPlayer(rateHz);
    player.load({
      values: roughValues(4096),
      drive: accumulatorAt(sampleRateHz),
      kernel: stepKernel(rateHz, stage),
    });
    return player;
  };
  const out = new Float32Array(quantum);
  const met = [48_000, 1e6, 4e6].map((hz) => {
    const player = playing(hz);
    const share = shareOfCore(() => player.process(out, 0, quantum));
    return judge(`A pin at ${hz / 1000} kHz, each entry another`, share, goals.heaviestShare, ' % of a core');
  });
  const player = playing(1e6);
  const share = shareOfCore(() => player.skip(quantum));
  met.push(judge('  the same unheard', share, goals.unheardShare, ' % of a core'));
  return met.every(Boolean);
}

function measureRounds({ programOf, RoundReader }: Engine): boolean {
  const voice: Voice = { values: roughValues(4096), cycles: 1, form: 'staircase', stage };
  const program = programOf(voice, { kind: 'loop', sampleRateHz: 4096 * 3.3 }, rateHz);
  if (program.kind !== 'round') throw new Error(`a round of 0.3 s is played as a ${program.kind}`);
  const reader = new RoundReader(rateHz);
  reader.load(program);
  const out = new Float32Array(quantum);
  const share = shareOfCore(() => reader.process(out, 0, quantum));
  return judge('A round of 7272 lines', share, goals.roundShare, ' % of a core');
}

function measureMaking({ programOf, predictedLines, rmsOfVoice, stepKernel }: Engine): boolean {
  const voice: Voice = { values: roughValues(4096), cycles: 1, form: 'staircase', stage };
  const loop: Drive = { kind: 'loop', sampleRateHz: 4096 * 55 };
  const works: [what: string, goal: number, work: () => unknown][] = [
    ['Making a round of 55 Hz', goals.makingMs, () => programOf(voice, loop, rateHz)],
    ['Making a pin’s kernel', goals.makingMs, () => stepKernel(rateHz, stage)],
    ['Predicting a loop', goals.predictingMs, () => predictedLines(voice, loop, rateHz)],
    [
      'Predicting an accumulator of 1 MHz',
      goals.predictingMs,
      () => predictedLines(voice, accumulatorAt(1e6), rateHz),
    ],
    ['Its RMS', goals.predictingMs, () => rmsOfVoice(voice, accumulatorAt(1e6), rateHz)],
  ];
  return works
    .map(([what, goal, work]) => {
      const times = Array.from({ length: 30 }, () => {
        const start = performance.now();
        work();
        return performance.now() - start;
      });
      return judge(what, median(times), goal, ' ms');
    })
    .every(Boolean);
}

/** Per cent of one core that a quantum's work takes where it has to keep up with the sound. */
function shareOfCore(work: () => void): number {
  const quanta = Math.ceil((seconds * rateHz) / quantum);
  for (let i = 0; i < quanta / 8; i += 1) work();
  const before = process.cpuUsage();
  for (let i = 0; i < quanta; i += 1) work();
  const { user, system } = process.cpuUsage(before);
  return ((user + system) / 1e6 / ((quanta * quantum) / rateHz)) * 100;
}
