import { renderSound } from '../../shared/listening/render-sound.ts';
import { wavFile } from '../../shared/listening/wav-file.ts';
import { fullScaleDbfs } from '../../shared/listening/wav-scale.ts';
import { keptPeakDbfs, type KeepJob, type KeepMessage } from './keep-sound-messages.ts';

/** Between two words on how far it is, in milliseconds. */
const tellMs = 100;
/** Of the whole work, the rest being the file. */
const renderingShare = 0.8;
/** Nothing of such a wave can be heard. */
const silenceDbfs = -180;

addEventListener('message', ({ data }: MessageEvent<KeepJob>) => {
  try {
    keep(data);
  } catch (error) {
    tell({ kind: 'failed', message: error instanceof Error ? error.message : String(error) });
  }
});

const tell = (message: KeepMessage, handed: Transferable[] = []) =>
  postMessage(message, { transfer: handed });

function keep({ order, depth, level, ditherSeed }: KeepJob): void {
  let toldAt = performance.now();
  const frames = renderSound(order, (share) => {
    if (performance.now() - toldAt < tellMs) return;
    toldAt = performance.now();
    tell({ kind: 'progress', share: renderingShare * share });
  });
  const { peak, rms } = measure(frames);
  if (!(dbOf(peak) > silenceDbfs)) {
    const limit = order.rateHz / 2;
    throw new RangeError(
      `It would be silent: no line of this sound lies below ${limit} Hz, half of the file’s rate.`,
    );
  }
  if (level === 'full-scale' && peak > 1 && depth !== '32f') {
    return tell({ kind: 'clips', peakDbfs: dbOf(peak) });
  }
  const fullDbfs = fullScaleDbfs(depth, ditherSeed !== null);
  const gain = level === 'peak' ? 10 ** ((keptPeakDbfs - fullDbfs) / 20) / peak : 1;
  if (gain !== 1) for (let i = 0; i < frames.length; i += 1) frames[i] *= gain;
  tell({ kind: 'progress', share: renderingShare });
  const file = wavFile(frames, { rateHz: order.rateHz, depth, ditherSeed });
  const inFile = (ratio: number) => dbOf(ratio * gain) + fullDbfs;
  const figures = { peakDbfs: inFile(peak), rmsDbfs: inFile(rms), fullScaleDbfs: inFile(1) };
  tell({ kind: 'done', file, ...figures }, [file.buffer]);
}

function measure(frames: Float32Array): { peak: number; rms: number } {
  let peak = 0;
  let sum = 0;
  for (const frame of frames) {
    peak = Math.max(peak, Math.abs(frame));
    sum += frame * frame;
  }
  return { peak, rms: Math.sqrt(sum / frames.length) };
}

const dbOf = (ratio: number) => 20 * Math.log10(ratio);
