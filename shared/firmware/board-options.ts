import type { Board } from '../contract/index.ts';
import { portMapTexts } from './port-map.ts';
import type { Target } from './target.ts';

/** Options by their names; one that is undefined is not there, an empty text is one that is set to nothing. */
type Given = Readonly<Record<string, unknown>>;
type Described = Pick<Target, 'options'>;

/** Options that say together where the bits go. */
export const pinOptions: readonly string[] = ['portMap', 'reservedPins', 'reservedBy'];
/** Options that say so without a map, and mean nothing beside one. */
const plainPortOptions = ['port', 'highPort'];

/** Options of a target that a board stands for: its clock and, of a ladder on ports, the map of its pins. */
export function boardOptionsFor(
  { options }: Described,
  { clock, output }: Board,
): Readonly<Record<string, string>> {
  const all = {
    ...(Number.isInteger(clock.hz) ? { clockHz: String(clock.hz) } : {}),
    ...(output.kind === 'ladder' ? portMapTexts(output.portMap) : {}),
  };
  return Object.fromEntries(Object.entries(all).filter(([name]) => name in options.shape));
}

/** A board's options as far as none that was set by hand stands in their place. */
export interface BoardShare {
  /** What comes from the board. */
  readonly taken: Readonly<Record<string, string>>;
  /** Options that the board has too, or whose place its pins would take, and that are set by hand. */
  readonly byHand: readonly string[];
}

/**
 * The board first, options by hand over it, each by itself, but for pins: a map that is set to nothing, or a plain port
 * without a map, puts away the board's whole map with its reserved pins, as they mean nothing beside it.
 */
export function boardShare(target: Described, board: Board, given: Given): BoardShare {
  const offered = boardOptionsFor(target, board);
  const isByHand = (name: string) => given[name] !== undefined;
  const plain =
    'portMap' in offered && !isByHand('portMap')
      ? plainPortOptions.filter((name) => isByHand(name) && given[name] !== '')
      : [];
  const isWithoutMap = given.portMap === '' || plain.length > 0;
  const taken = Object.entries(offered).filter(
    ([name]) => !isByHand(name) && !(isWithoutMap && pinOptions.includes(name)),
  );
  return {
    taken: Object.fromEntries(taken),
    byHand: [...Object.keys(offered).filter(isByHand), ...plain],
  };
}

/**
 * What a target does not take of a board, and why: a phrase each, empty where it takes clock and output. That it has no
 * option for a clock is none of these.
 */
export function notTakenOf({ options: { shape } }: Described, { clock, output }: Board): string[] {
  const phrases: string[] = [];
  if ('clockHz' in shape && !Number.isInteger(clock.hz)) {
    phrases.push(`its clock of ${clock.hz} Hz, as this target counts in whole hertz`);
  }
  if (output.kind === 'ladder' && !('portMap' in shape)) {
    phrases.push('its pins, as this target has no port map');
  }
  if (output.kind !== 'ladder') phrases.push(`${outputOf(output)}; ${instead(shape, output)}`);
  return phrases;
}

type OtherOutput = Exclude<Board['output'], { kind: 'ladder' }>;

function outputOf(output: OtherOutput): string {
  switch (output.kind) {
    case 'on-chip':
      return `its converter on the chip, ${output.bits} bits in a register of ${output.registerBits}, ${output.alignment}-aligned`;
    case 'serial':
      return `its converter behind a serial line, ${output.bits} bits in words of ${output.wordBits}`;
    case 'pwm':
      return `its pulse-width modulation of ${output.bits} bits`;
  }
}

/** Where the words go in its place. */
function instead(shape: object, output: OtherOutput): string {
  if ('port' in shape) return 'what plays writes the words to port pins';
  if (!('portAddress' in shape)) return 'the files hold words, and what sends them there is yours';
  return output.kind === 'on-chip' && output.alignment === 'right'
    ? 'what plays writes the words right-aligned to the address given as the output register, which may be that of its data register'
    : 'what plays writes the words right-aligned to the address given as the output register';
}
