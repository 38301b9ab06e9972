import { useEffect, useLayoutEffect, useMemo, useRef, useState } from 'react';
import { flushSync } from 'react-dom';
import type { PulsePattern } from '../../../../../shared/contract/index.ts';
import { patternScore } from '../../../../../shared/listening/pattern-score.ts';
import type { Sound } from '../../../../../shared/listening/sound.ts';
import { useListening, type Given } from '../listening.tsx';

const owner = 'pattern';

/** The panel's sound in the pattern's pulses: begun by a press, then following every change of either. */
export function useHeardPattern(pattern: PulsePattern) {
  const listening = useListening();
  const { hearing, take, status } = listening;
  const sound = useMemo(() => lasting(listening.sound), [listening.sound]);
  // The player begins anew with each score that is another object: with a changed pattern, and with each start.
  const [heard, setHeard] = useState(() => ({ pattern, score: patternScore(pattern) }));
  const current = heard.pattern === pattern ? heard : { pattern, score: patternScore(pattern) };
  if (current !== heard) setHeard(current);
  const { score } = current;
  const given = useMemo((): Given => ({ sound, hearing, score }), [sound, hearing, score]);

  const isOwner = listening.owner === owner;
  useEffect(() => {
    if (isOwner) take(owner, given);
  }, [isOwner, given, take]);
  useEffect(() => () => take(owner, null), [take]);

  const latest = useRef(listening);
  useLayoutEffect(() => {
    latest.current = listening;
  });
  return {
    isOwner,
    isPlaying: isOwner && status !== 'silent',
    /** Plays from the first pulse on. Belongs in the handler of a press. */
    play: () => {
      const fresh = patternScore(pattern);
      // The panel has the pattern before it is told to play, so that nothing else sounds first.
      flushSync(() => {
        setHeard({ pattern, score: fresh });
        take(owner, { sound, hearing, score: fresh });
      });
      if (latest.current.status === 'silent') latest.current.toggle();
    },
    stop: () => {
      if (latest.current.status !== 'silent') latest.current.toggle();
    },
    giveBack: () => take(owner, null),
  };
}

/** A table that plays once through would end within its first pulse: pulses are cut out of a tone that lasts. */
function lasting(sound: Sound): Sound {
  const { kind, sampleRateHz } = sound.drive;
  return kind === 'once' ? { ...sound, drive: { kind: 'loop', sampleRateHz } } : sound;
}
