import { Refusal } from '../../shared/contract/index.ts';
import {
  betterTable,
  cutCycle,
  definitionOfTable,
  draftsOf,
  findPeriod,
  oldTableOf,
  proposeBounds,
  readAny,
  readCsv,
  readIntelHex,
  readWav,
  reportOldTable,
  sayAddress,
  snapBounds,
  wordsOf,
  type Recording,
} from '../../shared/imports/index.ts';
import type { ImportJobs, ImportReply, ImportRequest } from './imports-messages.ts';

/** The recording that was opened last. */
let opened: Recording | null = null;

function theRecording(): Recording {
  if (opened === null) throw new Error('No recording is open.');
  return opened;
}

const jobs: ImportJobs = {
  readAny: ({ bytes, name }) => readAny(bytes, name),
  readColumns: ({ text, reading }) => readCsv(text, reading),
  readImage({ text, part: { words, address, bytes } }) {
    const segments = readIntelHex(text);
    const segment = segments.find(
      (one) => address >= one.address && address < one.address + one.bytes.length,
    );
    if (!segment) {
      const [first] = segments;
      const allowed = `${sayAddress(first.address)} to ${sayAddress(first.address + first.bytes.length - 1)}`;
      throw new Refusal({ path: 'address', value: sayAddress(address), allowed });
    }
    const from = address - segment.address;
    const left = segment.bytes.length - from;
    if (bytes > left)
      throw new Refusal({ path: 'bytes', value: String(bytes), allowed: `at most the ${left} there` });
    return wordsOf({ ...segment, address, bytes: segment.bytes.subarray(from, from + bytes) }, words);
  },
  readTable({ array, name }) {
    const table = oldTableOf(array);
    return {
      definition: definitionOfTable(name, table),
      report: reportOldTable(table),
      better: betterTable(name, table) ?? null,
    };
  },
  openRecording({ bytes, channel }) {
    opened = readWav(bytes, channel);
    const { samples, sampleRateHz, header } = opened;
    try {
      const found = findPeriod(samples, sampleRateHz);
      return { header, samples, found, why: null, bounds: proposeBounds(samples, found.periodSamples) };
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      const { value, allowed } = error.problems[0];
      const bounds = { startSample: 0, endSample: samples.length - 1 };
      return {
        header,
        samples,
        found: null,
        why: `This is ${value}; what can be found is ${allowed}.`,
        bounds,
      };
    }
  },
  findAgain({ bounds }) {
    const { samples, sampleRateHz } = theRecording();
    // Around the cycle alone: a tone may drift over the whole recording.
    const period = bounds.endSample - bounds.startSample;
    const from = Math.max(0, Math.floor(bounds.startSample - 6 * period));
    const near = samples.subarray(from, Math.min(samples.length, Math.ceil(bounds.endSample + 6 * period)));
    const found = findPeriod(near, sampleRateHz);
    const { startSample } = bounds;
    return {
      found,
      bounds: snapBounds(samples, { startSample, endSample: startSample + found.periodSamples }),
    };
  },
  snap: ({ bounds }) => snapBounds(theRecording().samples, bounds),
  cut: ({ bounds, length, join }) => cutCycle(theRecording().samples, bounds, length, join),
  drafts: ({ bytes, name }) => draftsOf(bytes, name),
};

addEventListener('message', ({ data }: MessageEvent<ImportRequest>) => postMessage(replyTo(data)));

function replyTo({ id, name, input }: ImportRequest): ImportReply {
  try {
    return { id, kind: 'done', result: (jobs[name] as (input: unknown) => unknown)(input) };
  } catch (error) {
    if (error instanceof Refusal) return { id, kind: 'refused', problems: error.problems };
    return { id, kind: 'failed', message: String(error) };
  }
}
