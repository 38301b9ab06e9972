import { patternMs, type PulsePattern } from '../../../../shared/contract/index.ts';
import { pulsesOptionFor, targets, type Target } from '../../../../shared/firmware/index.ts';
import { Button } from '../../../components/index.ts';
import type { TypedOptions } from './render-export.ts';

interface PulsesNoteProps {
  target: Target;
  pattern: PulsePattern;
  typed: TypedOptions;
  onTake: (options: TypedOptions) => void;
}

/** Says what becomes of the pattern that is kept with the table, and lets it be left out of the files. */
export function PulsesNote({ target, pattern, typed, onTake }: PulsesNoteProps) {
  const steps = `${pattern.steps.length} ${pattern.steps.length === 1 ? 'step' : 'steps'}`;
  const what = `pulses and pauses kept with this table (${steps}, ${patternMs(pattern).toLocaleString('en')} ms)`;
  if (!('pulses' in pulsesOptionFor(target, pattern))) {
    const able = targets.filter(({ options }) => 'pulses' in options.shape).map(({ id }) => id);
    return (
      <p className="figure-note">
        {target.title} carries no {what}. {able.slice(0, -1).join(', ')} and {able.at(-1)} do.
      </p>
    );
  }
  const given = typed.pulses ?? '';
  if (given === '') {
    return (
      <div className="flex flex-wrap items-center gap-2">
        <p className="figure-note">✓ The {what} are in the files.</p>
        <Button size="small" onPress={() => onTake({ pulses: 'none' })}>
          Leave them out
        </Button>
      </div>
    );
  }
  return (
    <div className="flex flex-wrap items-center gap-2">
      <p className="figure-note">
        The {what} are not in the files{given !== 'none' && ': others are given below'}.
      </p>
      <Button size="small" onPress={() => onTake({ pulses: '' })}>
        Put them in
      </Button>
    </div>
  );
}
