export type { Drive, Score, ScoreEvent, Sound, Voice } from './sound.ts';
export { driveAtTone, roundHzOf, toneHzOf } from './drive.ts';
export {
  curveLines,
  highestBelow,
  staircaseLines,
  throughResponse,
  type Response,
  type RoundLines,
} from './lines.ts';
export { stageResponse } from './stage-response.ts';
export { gridSizeFor, lagrange8, readRound, roundOnGrid, type RoundGrid } from './cycle.ts';
export { pinDelayFrames, type StepKernel } from './kernel-shape.ts';
export { bandGain, stepKernel } from './step-kernel.ts';
export { PinPlayer, pinRateHzAtMost, type PinProgram } from './pin-player.ts';
export { RoundReader, type RoundProgram } from './round-reader.ts';
export { renderPass, type Pass } from './curve-pass.ts';
export { heardLines, programOf, wayOf, type Program } from './program.ts';
export { predictedLines, rmsOfVoice, type PredictedLine } from './predicted-lines.ts';
export { rmsOfLines } from './rms.ts';
export {
  glideEvents,
  glideHzAt,
  glideSteps,
  planGlide,
  type Glide,
  type GlideSettings,
  type GlideStep,
} from './glide.ts';
export { pressNote, releaseNote, releaseNotesOf, soundingNote, type HeldNotes } from './held-notes.ts';
export { createMidiReader, type MidiEvent } from './midi-messages.ts';
export { a4RangeHz, bentHz, noteHz, noteName, noteNumber, noteNumbers } from './notes.ts';
export { planTone, toneReachHz, type PlayedTone, type ToneDrive, type ToneSetting } from './tone-drive.ts';
export {
  curveProblems,
  gainOf,
  levelAt,
  minimumPhaseImpulse,
  responseLimits,
  type ResponsePoint,
} from './device-response.ts';
export { deviceKinds, type DeviceKind } from './device-curves.ts';
export { fadeSeconds, renderSound, type RenderOrder } from './render-sound.ts';
export { wholeRounds, type WholeRounds } from './whole-rounds.ts';
export {
  bitsOffFigures,
  codesWithBitsOff,
  levelsOfTable,
  levelsOfVolts,
  lowestBits,
  masksOf,
  offFromBottom,
  soundWithBitsOff,
  type BitMask,
  type BitsOffFigures,
  type CodedTable,
} from './bits-off.ts';
export {
  answerTrial,
  beginRun,
  giveUp,
  guessingChance,
  rightNeeded,
  scoreOf,
  trialLimits,
  type BlindRun,
  type BlindScore,
  type BlindTrial,
  type Coin,
  type Side,
} from './blind-test.ts';
export { equallyLoud, type Matched } from './equal-loudness.ts';
