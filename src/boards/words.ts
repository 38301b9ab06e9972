import type { Board, OutputKind } from '../../shared/contract/index.ts';
import { formatQuantity } from '../../shared/quantities/index.ts';

export const outputKindWords: Readonly<Record<OutputKind, string>> = {
  ladder: 'R-2R ladder',
  'on-chip': 'On-chip converter',
  serial: 'Serial converter',
  pwm: 'PWM',
};

export const sayOutput = (kind: OutputKind, bits: number): string =>
  `${outputKindWords[kind]}, ${bits} ${bits === 1 ? 'bit' : 'bits'}`;

const q = (value: number | undefined, unit: string) =>
  value === undefined ? 'not given' : formatQuantity(value, unit, { significant: 6 });

/** A board in words, group by group, for reading and for laying two side by side. */
export function boardLines(board: Board): readonly { name: string; says: string }[] {
  const { supply, clock, timer, currents, output, stage, levels } = board;
  const lines: [string, string][] = [
    ['Name', board.name],
    ['Supply', `${q(supply.vLow, 'V')} to ${q(supply.vHigh, 'V')}`],
    ['Output', sayOutput(output.kind, output.bits)],
    ...outputLines(output),
    ['Current of one pin, at most', q(currents.pinAmps, 'A')],
    ['Current of all pins, at most', q(currents.totalAmps, 'A')],
    ['Load', stage.load === undefined ? 'none' : q(stage.load, 'Ω')],
    ['Capacitance at the output', q(stage.outputCapacitanceF, 'F')],
    [
      'Op-amp',
      stage.opAmp === undefined
        ? 'none'
        : `${q(stage.opAmp.slewRateVPerS, 'V/s')}, ${q(stage.opAmp.gainBandwidthHz, 'Hz')}`,
    ],
    ['Filter', sayFilter(stage.filter)],
    ['Rising edges later by', q(stage.edgeSkewS, 's')],
    ['Clock', `${q(clock.hz, 'Hz')} ± ${clock.tolerancePpm} ppm`],
    ['Timer', `prescalers ${timer.prescalers.join(', ')}; compare register of ${timer.compareBits} bits`],
    ['Flash for tables', board.flashBytes === undefined ? 'not given' : `${board.flashBytes} bytes`],
    ['Measured levels', levels === undefined ? 'none' : `${levels.length} voltages`],
  ];
  return lines.map(([name, says]) => ({ name, says }));
}

function outputLines(output: Board['output']): [string, string][] {
  switch (output.kind) {
    case 'ladder': {
      const { bits, ports } = output.portMap;
      return [
        ['R', q(output.R, 'Ω')],
        ['Pin resistance, high and low', `${q(output.rHigh, 'Ω')}, ${q(output.rLow, 'Ω')}`],
        ['Tolerance', `±${output.tolerancePercent} %, ${output.distribution}`],
        ['Pins, bit 0 first', bits.map(({ port, pin }) => `${port}${pin}`).join(' ')],
        [
          'Reserved pins',
          ports
            .flatMap(({ name, reserved, reservedPins }) =>
              reserved.map(({ pin, rest }) => `${name}${pin} ${rest} (${reservedPins})`),
            )
            .join(', ') || 'none',
        ],
        ...(output.rungs || output.series || output.terminator !== undefined
          ? [['Single resistors', 'given'] as [string, string]]
          : []),
      ];
    }
    case 'on-chip':
      return [
        ['Register', `${output.registerBits} bits, ${output.alignment}-aligned`],
        ['Output resistance', q(output.outputOhms, 'Ω')],
      ];
    case 'serial':
      return [
        ['Word', `${output.wordBits} bits, code shifted by ${output.shift}, ${output.byteOrder}`],
        ['Command bits', `0x${output.command.toString(16)}`],
        ['Output resistance', q(output.outputOhms, 'Ω')],
      ];
    case 'pwm':
      return [
        ['PWM', `${output.mode}, prescaler ${output.prescaler}`],
        ['Output resistance', q(output.outputOhms, 'Ω')],
      ];
  }
}

export function sayFilter(filter: Board['stage']['filter']): string {
  if (filter.kind === 'none') return 'none';
  const order = filter.kind === 'rc' ? 'first-order RC' : 'second-order Butterworth';
  return `${order}, ${q(filter.cutoffHz, 'Hz')}`;
}
