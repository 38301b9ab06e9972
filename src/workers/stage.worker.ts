import { analyseTable } from '../../shared/analysis/index.ts';
import { Refusal, sayProblem, type Board } from '../../shared/contract/index.ts';
import {
  assignResistors,
  boardOhms,
  boardVolts,
  firstImageOf,
  fitLevels,
  glitchesOf,
  histogramOf,
  ladderOf,
  ladderReport,
  linearityOf,
  meanSupplyAmps,
  opAmpFollows,
  outputLines,
  pwmCarrierHz,
  pwmRippleVolts,
  sinadAgainstBits,
  smallestR,
  stageGain,
  stagePartsOf,
  stageWaveform,
  toleranceForYield,
  Trials,
  type OutputLine,
} from '../../shared/output-stage/index.ts';
import type {
  LevelsAnswer,
  Played,
  PlayingAnswer,
  StageJob,
  StageLines,
  StageMessage,
  TrialsAnswer,
} from './stage-messages.ts';

/** Progress is told this often, in milliseconds. */
const tellMs = 100;
const histogramColumns = 40;
/** Points of a waveform that is drawn; more than a screen has columns, so that zooming shows more. */
const mostPoints = 24_576;
const mostPerHold = 32;
/** Images are shown up to this multiple of the sample rate, the strongest lines of them. */
const shownRates = 3;
const mostLines = 3_000;

addEventListener('message', ({ data }: MessageEvent<StageJob>) => {
  try {
    if (data.kind === 'trials') runTrials(data);
    else postMessage(answer(data));
  } catch (error) {
    const message = error instanceof Refusal ? error.problems.map(sayProblem).join(' ') : String(error);
    postMessage({ kind: 'failed', message } satisfies StageMessage);
  }
});

function answer(job: Exclude<StageJob, { kind: 'trials' }>): StageMessage {
  switch (job.kind) {
    case 'levels':
      return { kind: 'levels', ...levelsOf(job.board) };
    case 'playing':
      return { kind: 'playing', ...playing(job.board, job.played) };
    case 'tolerance':
      return { kind: 'tolerance', ...toleranceForYield(job.ladder, job.share, job.settings) };
    case 'bits':
      return { kind: 'bits', ...sinadAgainstBits(job.definition, job.ladder, job.settings, job) };
    case 'fit':
      return { kind: 'fit', ...fitLevels(job.definition, job.volts) };
    case 'places':
      return { kind: 'places', ...assignResistors(job.bag) };
  }
}

function levelsOf(board: Board): LevelsAnswer {
  const { output, supply, currents } = board;
  const volts = boardVolts(board);
  const ladder = ladderOf(board);
  const limits = {
    ...(currents.pinAmps !== undefined && { pinAmps: currents.pinAmps }),
    ...(currents.totalAmps !== undefined && { totalAmps: currents.totalAmps }),
  };
  const span = supply.vHigh - supply.vLow;
  return {
    volts,
    ideal: Float64Array.from(volts, (_, code) => supply.vLow + (span * code) / 2 ** output.bits),
    linearity: linearityOf(volts),
    mostOutputOhms: boardOhms(board).reduce((a, b) => Math.max(a, b)),
    ladder: ladder && ladderReport(ladder),
    smallest: ladder && {
      free: smallestR(ladder, limits),
      shorted: smallestR(ladder, { ...limits, shorted: true }),
    },
  };
}

function playing(board: Board, { table, codes, cycle, sampleRateHz, toneHz }: Played): PlayingAnswer {
  const volts = boardVolts(board);
  const ladder = ladderOf(board);
  const { output, stage, supply, clock } = board;
  const pointsPerHold = Math.max(2, Math.min(mostPerHold, Math.floor(mostPoints / codes.length)));
  const parts = stagePartsOf(board);
  const gain = (hz: number) => stageGain(parts, hz);
  const atPin = Float64Array.from(codes, (code) => volts[code]);
  const span = supply.vHigh - supply.vLow;
  const facts = { cycle, clippedSamples: 0 };
  const { levels: _own, ...evenTable } = table;
  const reportAt = (levels?: number[]) =>
    analyseTable(
      facts,
      { codes, clippedCodes: 0 },
      levels === undefined ? evenTable : { ...evenTable, levels },
    ).report;
  const [real, even] = [reportAt(Array.from(volts)), reportAt()];
  const carrierHz = output.kind === 'pwm' ? pwmCarrierHz(clock.hz, output) : null;
  return {
    waveform: stageWaveform({
      volts,
      outputOhms: boardOhms(board),
      codes,
      sampleRateHz,
      capacitanceF: stage.outputCapacitanceF,
      ...(stage.opAmp && { opAmp: stage.opAmp }),
      filter: stage.filter,
      pointsPerHold,
    }),
    pointsPerHold,
    sampleRateHz,
    tableLength: codes.length,
    lines: strongest(outputLines(atPin, sampleRateHz, shownRates * codes.length, gain), span / 2),
    sinadDb: real.sinadDb,
    snrDb: real.snrDb,
    codesSinadDb: even.sinadDb,
    codesSnrDb: even.snrDb,
    meanSupplyAmps: ladder && meanSupplyAmps(ladder, codes),
    image: toneHz > 0 && toneHz < sampleRateHz / 2 ? firstImageOf(toneHz, sampleRateHz, gain) : null,
    opAmp:
      stage.opAmp === undefined ? null : opAmpFollows(stage.opAmp, { volts, codes, sampleRateHz, toneHz }),
    glitch: glitchesOf(volts, codes, stage.edgeSkewS, 1).largest.at(0) ?? null,
    pwm:
      carrierHz === null
        ? null
        : { carrierHz, rippleVolts: pwmRippleVolts(1, 0.5, span, carrierHz, stage.filter) },
  };
}

/** Levels against a sine from rail to rail. */
function strongest(lines: readonly OutputLine[], fullVolts: number): StageLines {
  const kept = lines
    .filter(({ heldAmplitude }) => heldAmplitude > fullVolts * 1e-9)
    .sort((a, b) => b.heldAmplitude - a.heldAmplitude)
    .slice(0, mostLines)
    .sort((a, b) => a.multiple - b.multiple);
  const level = (amplitude: number) => 20 * Math.log10(Math.max(1e-12, amplitude / fullVolts));
  return {
    multiples: Int32Array.from(kept, ({ multiple }) => multiple),
    frequenciesHz: Float64Array.from(kept, ({ frequencyHz }) => frequencyHz),
    heldDb: Float64Array.from(kept, ({ heldAmplitude }) => level(heldAmplitude)),
    outputDb: Float64Array.from(kept, ({ amplitude }) => level(amplitude)),
  };
}

function runTrials({ ladder, settings, table }: Extract<StageJob, { kind: 'trials' }>): void {
  const trials = new Trials(ladder, settings, table ?? undefined);
  let toldAt = performance.now();
  while (!trials.isDone) {
    trials.run(64);
    if (trials.isDone || performance.now() - toldAt < tellMs) continue;
    postMessage({ kind: 'trials', ...trialsSoFar(trials) } satisfies StageMessage);
    toldAt = performance.now();
  }
  postMessage({ kind: 'trials', ...trialsSoFar(trials) } satisfies StageMessage);
}

function trialsSoFar(trials: Trials): TrialsAnswer {
  const { maxDnl, maxInl, sinadDb } = trials.figures();
  return {
    summary: trials.summary(),
    isDone: trials.isDone,
    maxDnl: histogramOf(maxDnl, histogramColumns),
    maxInl: histogramOf(maxInl, histogramColumns),
    sinadDb: sinadDb.length === 0 ? null : histogramOf(sinadDb, histogramColumns),
  };
}
