import { useEffect, useMemo } from 'react';
import {
  beginRun,
  rightNeeded,
  trialLimits,
  type Drive,
  type Voice,
} from '../../../../../shared/listening/index.ts';
import { useCurrentTeam } from '../../../../api/current-team.ts';
import { Button, Explain, NumberField } from '../../../../components/index.ts';
import { useLive } from '../../../../live/index.ts';
import { useSavedView } from '../../save/use-saved-links.ts';
import { useListening } from '../listening.tsx';
import { blindStore, changeBlind, type Pair } from './blind-store.ts';
import { drawCoin } from './draw-coin.ts';
import type { SideChoice } from './side-choice.ts';
import { SideFields } from './side-fields.tsx';
import { useMatched, type MatchedState } from './use-matched.ts';
import { useSide, type SideState } from './use-side.ts';
import { sayTurnedDown } from './words.ts';

/** Chooses the two and how often they are to be told apart. */
export function Setup() {
  const { table, sound, take } = useListening();
  const { a, b, trials } = useLive(blindStore);
  const team = useTeam();
  const stateA = useSide(a, team);
  const stateB = useSide(b, team);
  const { drive } = sound;
  const pair = usePair(stateA, stateB, drive);
  const areSame = pair !== null && isSame(pair);
  const matched = useMatched(areSame ? null : pair);
  const why = whyNot(stateA, stateB, drive, areSame, matched);

  const start = () => {
    if (pair === null || matched.kind !== 'matched' || stateA.kind !== 'ready' || stateB.kind !== 'ready')
      return;
    take('blind', { sound: { drive, voices: { a: matched.a, b: matched.b } }, hearing: 'a', isSecret: true });
    changeBlind({
      running: {
        run: beginRun(trials, drawCoin),
        pair,
        loudness: matched,
        words: { a: stateA.words, b: stateB.words },
        wave: table.definition.name,
        hears: 'a',
        hasHeardX: false,
      },
    });
  };

  return (
    <>
      <p className="field-description">
        X is A or B by the toss of a coin, anew in each trial. Listen to all three as often as you like, then
        say which X is.
      </p>
      <SideFields
        name="A"
        choice={a}
        onChange={(next) => changeBlind({ a: next })}
        state={stateA}
        team={team}
      />
      <SideFields
        name="B"
        choice={b}
        onChange={(next) => changeBlind({ b: next })}
        state={stateB}
        team={team}
      />
      {team === undefined && (
        <p className="field-description">Sign in to a team to hear another revision as well.</p>
      )}
      <NumberField
        label="Trials"
        isInteger
        min={trialLimits.min}
        max={trialLimits.max}
        allowed={`a whole number from ${trialLimits.min} to ${trialLimits.max}`}
        value={trials}
        onChange={(next) => changeBlind({ trials: next })}
        description={sayNeeded(trials)}
        aside={<TrialsExplain />}
      />
      <p role="status" className="field-description blind-loudness">
        {matched.kind === 'matched'
          ? `Equal loudness. ${sayTurnedDown(matched)}`
          : (why ?? 'Measuring the loudness…')}
        <LoudnessExplain />
      </p>
      <div>
        <Button variant="primary" onPress={start} isDisabled={why !== null} disabledReason={why ?? undefined}>
          Begin {trials} trials
        </Button>
      </div>
    </>
  );
}

/** The team that the bench's table belongs to, else the one in use. The table's own revisions are offered first. */
function useTeam(): string | undefined {
  const current = useCurrentTeam();
  const { link, isChanged } = useSavedView();
  const team = current === undefined ? undefined : (link?.team ?? current.teamSlug);
  const ownTable = link?.table;
  // Unchanged work is that revision itself, so the one before it is the other one.
  const ownNumber = link === null ? 1 : isChanged ? link.revision : Math.max(1, link.revision - 1);
  useEffect(() => {
    if (ownTable === undefined) return;
    const { a, b } = blindStore.now();
    const withOwn = (choice: SideChoice): SideChoice =>
      choice.picked === null ? { ...choice, picked: { table: ownTable, number: ownNumber } } : choice;
    changeBlind({ a: withOwn(a), b: withOwn(b) });
  }, [ownTable, ownNumber]);
  return team;
}

function usePair(a: SideState, b: SideState, drive: Drive): Pair | null {
  const [voiceA, voiceB] = [a, b].map((state) => (state.kind === 'ready' ? state.voice : null));
  return useMemo(
    () =>
      voiceA === null || voiceB === null || drive.kind === 'once' ? null : { a: voiceA, b: voiceB, drive },
    [voiceA, voiceB, drive],
  );
}

/** Whether both play the same: nothing could be told apart. */
function isSame({ a, b, drive }: Pair): boolean {
  const driveOf = (voice: Voice) => JSON.stringify(voice.drive ?? drive);
  return (
    a.form === b.form &&
    a.values.length === b.values.length &&
    driveOf(a) === driveOf(b) &&
    a.values.every((value, k) => value === b.values[k])
  );
}

/** Why a run cannot begin; null where it can. */
function whyNot(
  a: SideState,
  b: SideState,
  drive: Drive,
  areSame: boolean,
  matched: MatchedState,
): string | null {
  if (drive.kind === 'once')
    return 'A blind test goes on as long as one listens: set Played to a loop first.';
  if (a.kind === 'fault' || b.kind === 'fault') return 'Put right what A or B is first.';
  if (a.kind === 'waiting' || b.kind === 'waiting') return 'The table is being built.';
  if (areSame) return 'A and B play the same, sample for sample: choose another A or B.';
  switch (matched.kind) {
    case 'matched':
      return null;
    case 'waiting':
      return 'The loudness is being measured.';
    case 'failed':
      return `The loudness could not be measured: ${matched.fault}`;
    case 'silent':
      return matched.which === 'both'
        ? 'Neither of the two makes a sound.'
        : `${matched.which.toUpperCase()} makes no sound that the other could be brought to.`;
  }
}

function sayNeeded(trials: number): string {
  const needed = rightNeeded(trials);
  return needed === null
    ? 'Chosen beforehand, and kept.'
    : `Chosen beforehand, and kept. ${needed} right of ${trials} are reached by guessing in less than 5 % of runs.`;
}

function TrialsExplain() {
  return (
    <Explain title="Trials">
      <p>
        Who guesses is right in half of the trials on average. The probability of n or more right of m by
        guessing is <code>Σ C(m, k)/2^m</code>, k from n to m (binomial distribution, chance ½).
      </p>
      <p>
        It holds for a number of trials that is chosen beforehand. Who stops when the score looks good will
        sooner or later find one that does, so the key is shown only at the end.
      </p>
    </Explain>
  );
}

function LoudnessExplain() {
  return (
    <Explain title="Equal loudness">
      <p>
        The louder of two seems the better one, so both are brought to the same RMS first:{' '}
        <code>√(Σ a²/2)</code> over all lines of what is heard, up to half of the rate at which this browser
        plays, images included, mean out, through the device chosen under Where it is heard.
      </p>
      <p>
        The stronger one is turned down; nothing is turned up. Equal RMS is close to equal loudness for waves
        of like spectra; more treble may still seem louder.
      </p>
    </Explain>
  );
}
