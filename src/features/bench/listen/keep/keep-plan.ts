import { arrayNameFrom } from '../../../../../shared/firmware/c-identifier.ts';
import { driveAtTone, roundHzOf, toneHzOf } from '../../../../../shared/listening/drive.ts';
import type { RenderOrder } from '../../../../../shared/listening/render-sound.ts';
import { wholeRounds, type WholeRounds } from '../../../../../shared/listening/whole-rounds.ts';
import type { KeepJob } from '../../../../workers/keep-sound-messages.ts';
import type { Device, Given } from '../listening.tsx';
import { keepLimits, type KeepSettings } from './keep-settings.ts';

/** One seed for all: the same sound gives the same file. */
const ditherSeed = 1;
const headerBytes = 44;

export interface KeepPlan {
  readonly job: KeepJob;
  readonly fileName: string;
  readonly seconds: number;
  /** Size of the file. */
  readonly bytes: number;
  /** Where it is cut so that it goes on without a seam; null where it comes and goes with a fade. */
  readonly rounds: WholeRounds | null;
}

/** Whether it only goes round, and in less than the longest file, so that whole rounds can be cut out. */
export function canBeRounds({ sound, hearing, score }: Given): boolean {
  const voice = sound.voices[hearing];
  const drive = voice.drive ?? sound.drive;
  const isShort = keepLimits.seconds.max * roundHzOf(drive, voice.values.length) >= 1;
  return drive.kind === 'loop' && isShort && (score ?? null) === null;
}

/** What is made of a sound by the settings. */
export function planOf(given: Given, settings: KeepSettings, device: Device | null, name: string): KeepPlan {
  const { sound, hearing, score } = given;
  const { rateHz, depth, level } = settings;
  const voice = sound.voices[hearing];
  const own = voice.drive ?? sound.drive;
  const { values, cycles } = voice;
  const rounds =
    settings.ends === 'rounds' && canBeRounds(given)
      ? wholeRounds(roundHzOf(own, values.length), rateHz, settings.seconds)
      : null;
  const frames = rounds?.frames ?? Math.round(settings.seconds * rateHz);
  const toneHz = toneHzOf(own, values.length, cycles);
  const order: RenderOrder = {
    voice:
      rounds === null
        ? voice
        : { ...voice, drive: driveAtTone(own, values.length, cycles, rounds.roundHz * cycles) },
    drive: sound.drive,
    rateHz,
    frames,
    score: score ?? null,
    impulse: device === null ? null : device.impulseFor(rateHz),
    isFaded: rounds === null,
  };
  const isDithered = settings.isDithered && takesDither(depth);
  const bits = depth === '32f' ? 32 : Number(depth);
  return {
    job: { order, depth, level, ditherSeed: isDithered ? ditherSeed : null },
    fileName: fileNameOf(name, toneHz, rateHz, depth),
    seconds: frames / rateHz,
    bytes: headerBytes + 2 * Math.ceil((frames * bits) / 16),
    rounds,
  };
}

/** Below 24 bits the rounding can be heard. */
export const takesDither = (depth: KeepSettings['depth']) => depth === '8' || depth === '16';

/** Letters, digits, underscores, and one point: `fog_signal_tone_440hz_48000hz_16bit.wav`. */
export function fileNameOf(
  name: string,
  toneHz: number,
  rateHz: number,
  depth: KeepSettings['depth'],
): string {
  const tone = Number(toneHz.toPrecision(5))
    .toString()
    .replace('.', 'p')
    .replace(/[^0-9p]/g, '_');
  const bits = depth === '32f' ? 'float' : `${depth}bit`;
  return `${arrayNameFrom(name)}_${tone}hz_${rateHz}hz_${bits}.wav`;
}
