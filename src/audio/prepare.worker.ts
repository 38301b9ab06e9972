import type { PrepareJob, PrepareReply } from './prepare-messages.ts';
import { prepareGrids, prepareSound } from './prepare-sound.ts';

addEventListener('message', ({ data: { id, sound, score, rateHz, isWhole } }: MessageEvent<PrepareJob>) => {
  const tell = (reply: PrepareReply) => postMessage(reply);
  try {
    if (isWhole || score === null) tell({ id, program: prepareSound(sound, score, rateHz) });
    else tell({ id, grids: prepareGrids(sound, score, rateHz) });
  } catch (error) {
    tell({ id, trouble: error instanceof Error ? error.message : String(error) });
  }
});
