import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseBoard, type PortMap } from '../../shared/contract/index.ts';
import {
  boardOhms,
  boardVolts,
  firstImageOf,
  fullPowerBandwidthHz,
  glitchesOf,
  holdGain,
  ladderOf,
  largestStepOf,
  opAmpFollows,
  outputLines,
  portWordsOf,
  pwmCarrierHz,
  pwmDuty,
  pwmHarmonicVolts,
  pwmRippleVolts,
  pwmVolts,
  rcCutoffHz,
  registerWordsOf,
  serialBytesOf,
  serialWordsOf,
  settlingOf,
  slewTimeS,
  stageGain,
  stagePartsOf,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { boardWith, straightMap } from './support/boards.ts';
import { holds, noise } from './support/seeded.ts';

describe('settling and the op-amp', () => {
  it('settles to ½ LSB in τ·ln(2^(b+1))', () => {
    const { tauS, halfLsbS } = settlingOf(10_000, 1e-9, 8);
    expect(tauS).toBeCloseTo(1e-5, 15);
    expect(Math.exp(-halfLsbS / tauS) * 2 ** 8).toBeCloseTo(0.5, 12);
  });

  it('is as fast as its slew rate', () => {
    // The steepest of V·sin(2πft) is 2πfV.
    const hz = fullPowerBandwidthHz(5e5, 2.5);
    expect(2 * Math.PI * hz * 2.5).toBeCloseTo(5e5, 6);
    expect(slewTimeS(-3, 1e6)).toBeCloseTo(3e-6, 15);
  });

  it('finds the largest step, seam included, lowest index first', () => {
    const volts = [0, 1, 2, 3];
    expect(largestStepOf(volts, [0, 1, 3, 2])).toEqual({ index: 1, from: 1, to: 3, volts: 2 });
    expect(largestStepOf(volts, [0, 1, 2, 3])).toEqual({ index: 3, from: 3, to: 0, volts: -3 });
    expect(largestStepOf(volts, [2, 2])).toEqual({ index: 0, from: 2, to: 2, volts: 0 });
  });

  it('says whether the op-amp follows', () => {
    const loop = { volts: [0, 1, 2, 3], codes: [0, 3], sampleRateHz: 10_000, toneHz: 5000 };
    const quick = opAmpFollows({ slewRateVPerS: 1e6, gainBandwidthHz: 1e6 }, loop);
    expect(quick).toMatchObject({ toneFits: true, stepsSettle: true, slewTimeS: 3e-6 });
    expect(quick.fullPowerBandwidthHz).toBeCloseTo(1e6 / (2 * Math.PI * 1.5), 6);
    const slow = opAmpFollows({ slewRateVPerS: 3e4, gainBandwidthHz: 5000 }, loop);
    expect(slow).toMatchObject({ toneFits: false, stepsSettle: false });
    expect(slow.toneDb).toBeCloseTo(-3.0103, 4);
  });
});

describe('hold, images and filters', () => {
  it('has the lines of §5, the sample rate a zero', () => {
    const values = noise(12, 3);
    const lines = outputLines(values, 12_000, 30);
    expect(lines[11]).toEqual({ multiple: 12, frequencyHz: 12_000, heldAmplitude: 0, amplitude: 0 });
    const base = lines[4].heldAmplitude / holdGain(5, 12);
    expect(lines[16].heldAmplitude).toBeCloseTo(base * holdGain(17, 12), 12);
    expect(lines[18].heldAmplitude).toBeCloseTo(base * holdGain(19, 12), 12);
  });

  it('a square wave at half the rate has its line 4/π', () => {
    expect(outputLines(Float64Array.from([1, -1]), 2, 1)[0].heldAmplitude).toBeCloseTo(4 / Math.PI, 12);
  });

  it('the first image lies f/(fs − f) below the tone, and the filter adds to that', () => {
    const image = firstImageOf(1000, 16_000, (hz) =>
      stageGain({ outputOhms: 0, capacitanceF: 0, filter: { kind: 'butterworth', cutoffHz: 3000 } }, hz),
    );
    expect(image.frequencyHz).toBe(15_000);
    expect(image.heldDb).toBeCloseTo(20 * Math.log10(1 / 15), 12);
    const gainDb = (hz: number) => -10 * Math.log10(1 + (hz / 3000) ** 4);
    expect(image.outputDb).toBeCloseTo(image.heldDb + gainDb(15_000) - gainDb(1000), 10);
  });

  it('gives the cut-off of a resistor and a capacitor', () => {
    expect(rcCutoffHz(1000, 1e-6)).toBeCloseTo(159.1549, 4);
  });
});

describe('glitches', () => {
  const volts = Array.from({ length: 16 }, (_, code) => code);

  it('fall below where rising edges come later, rise above where they come earlier', () => {
    const late = glitchesOf(volts, [7, 8], 2e-9);
    expect(late.areas[0]).toBeCloseTo(-14e-9, 18);
    expect(late.largest[0]).toEqual({
      index: 0,
      from: 7,
      to: 8,
      through: 0,
      excursionVolts: -7,
      areaVs: late.areas[0],
    });
    const early = glitchesOf(volts, [7, 8], -2e-9);
    expect(early.largest[0]).toMatchObject({ through: 15, excursionVolts: 7 });
    expect(early.areas[0]).toBeCloseTo(14e-9, 18);
  });

  it('are none where bits only rise or only fall', () => {
    const { areas, largest } = glitchesOf(volts, [0, 1, 3, 7, 15, 14, 12, 8], 1e-9);
    expect(Array.from(areas)).toEqual(new Array(8).fill(0));
    expect(largest).toEqual([]);
  });

  it('are listed largest first, then by place', () => {
    const { largest } = glitchesOf(volts, [7, 8, 7, 4, 3, 4], 1e-9, 3);
    expect(largest.map(({ index }) => index)).toEqual([0, 1, 3]);
  });

  it('grow with the skew and change sign with neither its sign nor the levels’ order', () => {
    holds(
      fc.property(fc.array(fc.integer({ min: 0, max: 15 }), { minLength: 2, maxLength: 20 }), (codes) => {
        const one = glitchesOf(volts, codes, 1e-9).areas;
        const three = glitchesOf(volts, codes, 3e-9).areas;
        return one.every((area, k) => area <= 0 && Math.abs(three[k] - 3 * area) < 1e-20);
      }),
    );
  });
});

describe('PWM', () => {
  const fast = { bits: 8, mode: 'fast', prescaler: 8 } as const;
  const correct = { bits: 8, mode: 'phase-correct', prescaler: 8 } as const;

  it('has the carriers and duties of both modes', () => {
    expect(pwmCarrierHz(16e6, fast)).toBeCloseTo(16e6 / 8 / 256, 9);
    expect(pwmCarrierHz(16e6, correct)).toBeCloseTo(16e6 / 8 / 510, 9);
    expect([0, 127, 255].map((code) => pwmDuty(code, fast))).toEqual([1 / 256, 0.5, 1]);
    expect([0, 51, 255].map((code) => pwmDuty(code, correct))).toEqual([0, 0.2, 1]);
    const levels = pwmVolts(correct, { vHigh: 3, vLow: -1 });
    expect([levels[0], levels[255]]).toEqual([-1, 3]);
  });

  it('has the harmonics of its pulses', () => {
    // Those of a pulse between 0 and the span, from the sum of its samples.
    const duty = 0.3;
    for (const m of [1, 2, 3, 7]) {
      const count = 100_000;
      let [re, im] = [0, 0];
      for (let k = 0; k < count * duty; k += 1) {
        re += 5 * Math.cos((2 * Math.PI * m * (k + 0.5)) / count);
        im += 5 * Math.sin((2 * Math.PI * m * (k + 0.5)) / count);
      }
      expect(pwmHarmonicVolts(m, duty, 5)).toBeCloseTo((2 * Math.hypot(re, im)) / count, 6);
    }
    expect([0, 1].map((edge) => pwmHarmonicVolts(1, edge, 5))).toEqual([0, 0]);
    expect(pwmRippleVolts(2, 0.25, 5, 1000, { kind: 'rc', cutoffHz: 2000 })).toBeCloseTo(
      pwmHarmonicVolts(2, 0.25, 5) * Math.SQRT1_2,
      12,
    );
  });
});

describe('a port map', () => {
  const map: PortMap = parseMap({
    bits: [
      { port: 'B', pin: 7 },
      { port: 'D', pin: 0 },
      { port: 'B', pin: 2 },
    ],
    ports: [
      { name: 'B', reserved: [{ pin: 4, rest: 'high' }, { pin: 5 }] },
      { name: 'D', reserved: [{ pin: 1, rest: 'high' }], reservedPins: 'kept' },
    ],
  });
  function parseMap(portMap: object): PortMap {
    const { output } = parseBoard(boardWith({ bits: 3, portMap: portMap as never }));
    return (output as { portMap: PortMap }).portMap;
  }

  it('puts bits on their pins and bakes rest levels in, or leaves them', () => {
    const { ports, isSplit } = portWordsOf([0, 1, 2, 4, 7], map);
    expect(isSplit).toBe(true);
    expect(ports.map(({ name, mask, restWord }) => [name, mask, restWord])).toEqual([
      ['B', 0x84, 0x10],
      ['D', 0x01, 0x02],
    ]);
    expect(Array.from(ports[0].words)).toEqual([0x10, 0x90, 0x10, 0x14, 0x94]);
    expect(Array.from(ports[1].words)).toEqual([0, 0, 1, 0, 1]);
  });

  it('gives every code back, two’s complement too', () => {
    for (const code of [-4, -3, -2, -1, 0, 1, 2, 3]) {
      const { ports } = portWordsOf([code], map);
      const back = map.bits.reduce((sum, { port, pin }, bit) => {
        const word = ports.find(({ name }) => name === port)?.words[0] ?? 0;
        return sum + ((word >>> pin) & 1) * 2 ** bit;
      }, 0);
      expect(back).toBe(code & 7);
    }
  });

  it('straight on one port changes nothing, and reaches pin 31', () => {
    const { ports, isSplit } = portWordsOf([0, 129, 255], straightMapOf(8));
    expect(isSplit).toBe(false);
    expect(Array.from(ports[0].words)).toEqual([0, 129, 255]);
    const high = parseBoard(
      boardWith({ bits: 1, portMap: { bits: [{ port: 'A', pin: 31 }], ports: [{ name: 'A', width: 32 }] } }),
    ).output as { portMap: PortMap };
    expect(portWordsOf([1], high.portMap).ports[0].words[0]).toBe(2 ** 31);
  });
  const straightMapOf = (bits: number) =>
    (parseBoard(boardWith({ bits, portMap: straightMap(bits) })).output as { portMap: PortMap }).portMap;
});

describe('words of converters', () => {
  it('lie left or right in the register', () => {
    const output = { bits: 12, registerBits: 16 } as const;
    expect(Array.from(registerWordsOf([0, 1, 4095], { ...output, alignment: 'right' }))).toEqual([
      0, 1, 4095,
    ]);
    expect(Array.from(registerWordsOf([0, 1, 4095], { ...output, alignment: 'left' }))).toEqual([
      0, 16, 65_520,
    ]);
    expect(registerWordsOf([-1], { bits: 16, registerBits: 32, alignment: 'left' })[0]).toBe(0xffff_0000);
  });

  it('carry command, shift and mask, and leave byte by byte', () => {
    const output = { bits: 12, wordBits: 16, shift: 2, command: 0xc000, byteOrder: 'big-endian' } as const;
    expect(Array.from(serialWordsOf([0xabc], output))).toEqual([0xeaf0]);
    expect(Array.from(serialBytesOf([0xabc], output))).toEqual([0xea, 0xf0]);
    expect(Array.from(serialBytesOf([0xabc], { ...output, byteOrder: 'little-endian' }))).toEqual([
      0xf0, 0xea,
    ]);
    expect(
      Array.from(
        serialBytesOf([0xffff], { bits: 16, wordBits: 24, shift: 4, command: 0, byteOrder: 'big-endian' }),
      ),
    ).toEqual([0x0f, 0xff, 0xf0]);
    expect(
      serialWordsOf([0xffff], { bits: 16, wordBits: 32, shift: 16, command: 3, byteOrder: 'big-endian' })[0],
    ).toBe(0xffff_0003);
  });
});

describe('levels of a board', () => {
  it('are those of its ladder, unloaded behind an op-amp', () => {
    const loaded = parseBoard(boardWith({ R: 1000 }, { stage: { load: 8 } }));
    const buffered = parseBoard(
      boardWith({ R: 1000 }, { stage: { load: 8, opAmp: { slewRateVPerS: 1e6, gainBandwidthHz: 1e6 } } }),
    );
    expect(ladderOf(loaded)?.load).toBe(8);
    expect(ladderOf(buffered)?.load).toBeUndefined();
    expect(boardVolts(loaded)).toEqual(
      voltsOf({ ...(ladderOf(buffered) as never as object), load: 8 } as never),
    );
    expect(boardVolts(buffered)[128]).toBeCloseTo(2.5, 12);
    expect(boardOhms(buffered)[3]).toBeCloseTo(1000, 9);
    expect(boardOhms(loaded)[3]).toBeCloseTo(8000 / 1008, 9);
    expect(stagePartsOf(buffered)).toMatchObject({ opAmp: { slewRateVPerS: 1e6 }, filter: { kind: 'none' } });
  });

  it('are measured ones where there are some', () => {
    const levels = [0, 1.1, 2.4, 3.7];
    expect(Array.from(boardVolts(parseBoard(boardWith({ bits: 2 }, { levels }))))).toEqual(levels);
  });

  it('of other converters are those of the ideal one, less what a load takes', () => {
    const onChip = parseBoard(
      boardWith({}, { output: { kind: 'on-chip', bits: 2, outputOhms: 100 }, stage: { load: 300 } }),
    );
    expect(ladderOf(onChip)).toBeNull();
    expect(Array.from(boardVolts(onChip))).toEqual([0, 0.9375, 1.875, 2.8125]);
    expect(boardOhms(onChip)[0]).toBe(75);
    const pwm = parseBoard(
      boardWith({}, { output: { kind: 'pwm', bits: 2 }, supply: { vHigh: 3, vLow: 1 } }),
    );
    expect(Array.from(boardVolts(pwm))).toEqual([1.5, 2, 2.5, 3]);
  });
});
