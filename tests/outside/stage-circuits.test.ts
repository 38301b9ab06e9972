import { describe, expect, it } from 'vitest';
import type { OpAmp, OutputFilter } from '../../shared/contract/index.ts';
import {
  filterGain,
  outputOhmsOf,
  settlingOf,
  stageWaveform,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from '../engine/support/ladders.ts';
import { simulate, valueAt, vectorOf } from './support/spice.ts';

// Source: ngspice 39 (Debian), a circuit simulator; filters are built from R, L and C, the op-amp from a limited
// current into a capacitor.

/** Parts of a filter from `in` to `out`, driven by an ideal source. */
function filterCircuit(filter: OutputFilter): string[] {
  if (filter.kind === 'none') return ['Eout out 0 in 0 1'];
  const rate = 2 * Math.PI * filter.cutoffHz;
  const farads = 1e-8;
  if (filter.kind === 'rc') return [`Rf in out ${1 / (rate * farads)}`, `Cf out 0 ${farads}`];
  // 1/(1 + s·RC + s²·LC) with LC = 1/ω² and RC = √2/ω.
  return [
    `Rf in mid ${Math.SQRT2 / (rate * farads)}`,
    `Lf mid out ${1 / (rate * rate * farads)}`,
    `Cf out 0 ${farads}`,
  ];
}

describe('magnitudes of filters against .ac', () => {
  it.each(['rc', 'butterworth'] as const)('%s, six decades within 1 part in 10⁶', async (kind) => {
    const filter = { kind, cutoffHz: 3456 };
    const answer = await simulate(['Vin in 0 dc 0 ac 1', ...filterCircuit(filter)], 'ac dec 20 1 1meg', [
      'out',
    ]);
    const frequencies = vectorOf(answer, 'frequency');
    const magnitudes = vectorOf(answer, 'v(out)');
    expect(frequencies.length).toBeGreaterThan(100);
    frequencies.forEach((hz, i) => expect(filterGain(filter, hz) / magnitudes[i]).toBeCloseTo(1, 6));
  });
});

/** A whole ladder whose pins switch as the codes say, twice over, and what follows it. */
function stageCircuit(
  bits: number,
  codes: readonly number[],
  {
    R,
    holdS,
    farads,
    opAmp,
    filter,
  }: { R: number; holdS: number; farads: number; opAmp?: OpAmp; filter: OutputFilter },
  loops: number,
): string[] {
  const edgeS = holdS * 1e-5;
  const played = Array.from({ length: loops }, () => codes).flat();
  const lines = [`Rt n0 0 ${2 * R}`, `Cp n${bits - 1} 0 ${farads}`];
  for (let bit = 0; bit < bits; bit += 1) {
    const levelOf = (code: number) => ((code >> bit) & 1 ? 5 : 0);
    const corners = played.flatMap((code, k) => {
      const before = levelOf(played[k === 0 ? played.length - 1 : k - 1]);
      return before === levelOf(code)
        ? []
        : [
            [k * holdS - edgeS / 2, before],
            [k * holdS + edgeS / 2, levelOf(code)],
          ];
    });
    const after = corners.filter(([time]) => time > 0);
    const pairs = [[0, levelOf(played[0])], ...after].map(([time, volts]) => `${time} ${volts}`);
    lines.push(`Vp${bit} p${bit} 0 PWL(${pairs.join('\n+ ')})`, `Rr${bit} p${bit} n${bit} ${2 * R}`);
    if (bit > 0) lines.push(`Rs${bit} n${bit - 1} n${bit} ${R}`);
  }
  if (opAmp === undefined) lines.push(`Ein in 0 n${bits - 1} 0 1`);
  else {
    const rate = 2 * Math.PI * opAmp.gainBandwidthHz;
    lines.push(
      'Cb buf 0 1u',
      `Bb 0 buf I = 1u * max(${-opAmp.slewRateVPerS}, min(${opAmp.slewRateVPerS}, ${rate} * (v(n${bits - 1}) - v(buf))))`,
      'Ein in 0 buf 0 1',
    );
  }
  return [...lines, ...filterCircuit(filter)];
}

describe('the waveform against .tran', () => {
  const bits = 4;
  const codes = [0, 15, 8, 7, 3, 12, 12, 1];
  const R = 10_000;
  const sampleRateHz = 20_000;
  const ladder = ladderWith({ bits, R });
  it.each<[string, number, OpAmp | undefined, OutputFilter]>([
    ['settling alone', 1.2e-9, undefined, { kind: 'none' }],
    ['an op-amp that slews', 1e-12, { slewRateVPerS: 2e5, gainBandwidthHz: 2e5 }, { kind: 'none' }],
    ['settling and slewing', 1e-9, { slewRateVPerS: 1.5e5, gainBandwidthHz: 1e5 }, { kind: 'none' }],
    [
      'settling, slewing and an RC',
      1e-9,
      { slewRateVPerS: 1.5e5, gainBandwidthHz: 1e5 },
      { kind: 'rc', cutoffHz: 9000 },
    ],
    [
      'settling, slewing and a Butterworth',
      5e-10,
      { slewRateVPerS: 2e5, gainBandwidthHz: 1e5 },
      { kind: 'butterworth', cutoffHz: 6000 },
    ],
  ])('%s, within 2 mV of 5 V', async (_name, farads, opAmp, filter) => {
    const holdS = 1 / sampleRateHz;
    const loops = 3;
    const elements = stageCircuit(bits, codes, { R, holdS, farads, ...(opAmp && { opAmp }), filter }, loops);
    const endS = loops * codes.length * holdS;
    const nodes = ['n3', 'out', ...(opAmp ? ['buf'] : [])];
    const answer = await simulate(elements, `tran ${holdS / 400} ${endS} 0 ${holdS / 400}`, nodes);
    const times = vectorOf(answer, 'time');

    const pointsPerHold = 16;
    const wave = stageWaveform({
      volts: voltsOf(ladder),
      outputOhms: outputOhmsOf(ladder),
      codes,
      sampleRateHz,
      capacitanceF: farads,
      ...(opAmp && { opAmp }),
      filter,
      pointsPerHold,
    });
    expect(wave.isSteady).toBe(true);
    if (opAmp) expect(wave.slewingShare).toBeGreaterThan(0.1);
    const from = ((loops - 1) * codes.length) / sampleRateHz;
    let farthest = 0;
    wave.timeS.forEach((time, i) => {
      // Edges of the circuit take a while; points on them are left to those beside them.
      if (i % pointsPerHold === 0) return;
      const theirs = (node: string) => valueAt(times, vectorOf(answer, `v(${node})`), from + time);
      farthest = Math.max(
        farthest,
        Math.abs(wave.pin[i] - theirs('n3')),
        Math.abs(wave.output[i] - theirs('out')),
        opAmp ? Math.abs(wave.buffer[i] - theirs('buf')) : 0,
      );
    });
    expect(farthest).toBeLessThan(2e-3);
  });

  it('a full step is within ½ LSB after τ·ln(2^(b+1)), to 1 %', async () => {
    const eight = ladderWith({ bits: 8, R });
    const farads = 1e-9;
    const { halfLsbS } = settlingOf(outputOhmsOf(eight)[255], farads, 8);
    const step = { R, holdS: 3e-4, farads, filter: { kind: 'none' } } as const;
    const answer = await simulate(stageCircuit(8, [0, 255], step, 1), 'tran 50n 600u 0 50n', ['n7']);
    const times = vectorOf(answer, 'time');
    const volts = vectorOf(answer, 'v(n7)');
    const settled = voltsOf(eight)[255];
    const halfLsb = settled / 256 / 2;
    // A step of L − 1 LSB comes to ½ LSB a little sooner than one of L.
    const last = times.findLastIndex((time, i) => time > 3e-4 && Math.abs(volts[i] - settled) > halfLsb);
    expect((times[last] - 3e-4) / halfLsbS).toBeGreaterThan(0.98);
    expect((times[last] - 3e-4) / halfLsbS).toBeLessThan(1.01);
  });
});
