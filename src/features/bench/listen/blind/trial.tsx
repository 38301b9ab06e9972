import { useEffect, useMemo, useRef, useState, type KeyboardEvent } from 'react';
import { answerTrial, giveUp, type Side } from '../../../../../shared/listening/index.ts';
import {
  Button,
  Dialog,
  Kbd,
  useKeyGroup,
  useSingleKeySetting,
  type KeyGroup,
} from '../../../../components/index.ts';
import { useListening, type Given } from '../listening.tsx';
import { moveOn, type RunningTest } from './blind-store.ts';
import { drawCoin } from './draw-coin.ts';
import { useMatched } from './use-matched.ts';

const owner = 'blind';

const blindKeys: KeyGroup = {
  title: 'Blind test, while the focus is in it',
  keys: [
    { caps: ['1'], does: 'Hear A; so does the key A', isSingle: true },
    { caps: ['2'], does: 'Hear B; so does the key B', isSingle: true },
    { caps: ['3'], does: 'Hear X; so does the key X', isSingle: true },
  ],
};

type Heard = RunningTest['hears'];
const heardByKey: Readonly<Record<string, Heard>> = { 1: 'a', a: 'a', 2: 'b', b: 'b', 3: 'x', x: 'x' };
const names: readonly { heard: Heard; name: string; cap: string }[] = [
  { heard: 'a', name: 'A', cap: '1' },
  { heard: 'b', name: 'B', cap: '2' },
  { heard: 'x', name: 'X', cap: '3' },
];

/**
 * One trial of a run. Nothing on the page tells which X is: A and B both sound all the time, one of them let through,
 * and what is drawn does not depend on the coin.
 */
export function Trial({ test }: { test: RunningTest }) {
  const listening = useListening();
  const { status, toggle, take } = listening;
  const { run, words, hears, hasHeardX } = test;
  const [areKeysOn] = useSingleKeySetting();
  const [isEnding, setEnding] = useState(false);
  const given = useGiven(test);
  const isOwner = listening.owner === owner;
  useKeyGroup(blindKeys);
  useEffect(() => {
    if (isOwner) take(owner, given);
  }, [isOwner, given, take]);
  useEffect(() => () => take(owner, null), [take]);
  const first = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    // The button that began the run is gone, and the focus with it.
    if (document.activeElement === document.body) first.current?.focus({ preventScroll: true });
  }, []);

  const hear = (next: Heard) => {
    if (!isOwner) take(owner, listening.sounding);
    moveOn({ ...test, hears: next, hasHeardX: hasHeardX || next === 'x' });
    if (status === 'silent') toggle();
  };
  // Each trial begins with A, whatever X was and will be.
  const answer = (said: Side) =>
    moveOn({ ...test, run: answerTrial(run, said, drawCoin), hears: 'a', hasHeardX: false });
  const onKeyDown = (event: KeyboardEvent) => {
    const next = heardByKey[event.key.toLowerCase()];
    if (next === undefined || !areKeysOn || event.ctrlKey || event.metaKey || event.altKey) return;
    // A key of what has the focus is no shortcut of the bench.
    event.preventDefault();
    if (!event.repeat) hear(next);
  };

  const number = run.answered.length + 1;
  return (
    <div className="blind-trial" role="group" aria-label="Trial" onKeyDown={onKeyDown}>
      <p role="status" className="blind-count">
        Trial {number} of {run.trials}
      </p>
      <div className="blind-hear" role="group" aria-label="Hear">
        {names.map(({ heard, name, cap }) => (
          <button
            key={heard}
            ref={heard === 'a' ? first : undefined}
            type="button"
            className="blind-voice"
            aria-pressed={hears === heard}
            aria-keyshortcuts={areKeysOn ? cap : undefined}
            onClick={() => hear(heard)}
          >
            <span className="sr-only">Hear </span>
            <span className="blind-letter">{name}</span>
            <span className="sr-only">: </span>
            <span className="blind-words">{heard === 'x' ? 'one of the two' : words[heard]}</span>
            {areKeysOn && (
              <span aria-hidden="true">
                <Kbd>{cap}</Kbd>
              </span>
            )}
          </button>
        ))}
      </div>
      <div className="blind-answer">
        {(['a', 'b'] as const).map((side) => (
          <Button
            key={side}
            variant="primary"
            onPress={() => answer(side)}
            isDisabled={!hasHeardX}
            disabledReason="Listen to X first"
          >
            X is {side.toUpperCase()}
          </Button>
        ))}
      </div>
      <p className="field-description">
        A, B and X start the sound, each as it was on the bench when the run began: changes there do not reach
        it. To change A or B, end the run.
      </p>
      <div>
        <Button size="small" variant="quiet" onPress={() => setEnding(true)}>
          End the run…
        </Button>
      </div>
      <EndDialog
        answered={run.answered.length}
        trials={run.trials}
        isOpen={isEnding}
        onClose={() => setEnding(false)}
        onEnd={() => moveOn({ ...test, run: giveUp(run) })}
      />
    </div>
  );
}

/** Both voices at one loudness, for the rate at which it turns out to be played; and which of them is let through. */
function useGiven({ pair, loudness, hears, run }: RunningTest): Given {
  const matched = useMatched(pair);
  const { a, b } = matched.kind === 'matched' ? matched : loudness;
  const sound = useMemo(() => ({ drive: pair.drive, voices: { a, b } }), [pair, a, b]);
  const hearing = hears === 'x' ? (run.x ?? 'a') : hears;
  return useMemo(() => ({ sound, hearing, isSecret: true }), [sound, hearing]);
}

interface EndDialogProps {
  answered: number;
  trials: number;
  isOpen: boolean;
  onClose: () => void;
  onEnd: () => void;
}

function EndDialog({ answered, trials, isOpen, onClose, onEnd }: EndDialogProps) {
  return (
    <Dialog
      title="End the run?"
      isOpen={isOpen}
      onClose={onClose}
      actions={
        <>
          <Button variant="danger" onPress={onEnd}>
            End it and show the key
          </Button>
          <Button onPress={onClose}>Go on with the trials</Button>
        </>
      }
    >
      <p>
        {answered} of {trials} trials are answered. A run that is ended cannot go on: its score is kept with a
        note that it was ended early, and A, B and the number of trials can be changed for the next one.
      </p>
    </Dialog>
  );
}
