import { Button } from '../../../components/index.ts';
import { FieldProblem } from '../../../components/field-frame.tsx';
import { useListenControls, useListening, type Heard } from './listening.tsx';

/** Who else may decide what sounds, by the names that `take` knows. */
const owners: Readonly<Record<string, string>> = {
  bits: 'Bits by ear',
  blind: 'The blind test',
  keys: 'Keys and notes',
  pattern: 'Pulses and pauses',
};

/** What sounds, who decides it, and what keeps it away. */
export function ListenStatus() {
  const { status, trouble, owner, hearing, sounding, board } = useListening();
  const { giveBack, wasHidden } = useListenControls();
  const { kind } = sounding.sound.drive;
  const isOwn = owner === null;
  return (
    <>
      <div role="status">
        {status === 'starting' && <p className="field-description">Starting…</p>}
        {status === 'playing' && isOwn && (
          <p className="field-description">
            Playing {nameOf(hearing, board?.output.kind)} {manner[kind]}.
          </p>
        )}
        {wasHidden && (
          <p className="field-description">It stopped because this tab was hidden. Press play to go on.</p>
        )}
        {trouble !== null && <FieldProblem id="listen-trouble">{trouble}</FieldProblem>}
      </div>
      {!isOwn && (
        <div className="listen-owner">
          <p>{owners[owner] ?? owner} decides what sounds.</p>
          <Button size="small" onPress={giveBack}>
            Give back
          </Button>
        </div>
      )}
    </>
  );
}

const manner = {
  loop: 'as a loop',
  once: 'once through',
  accumulator: 'by the phase accumulator',
} as const;

function nameOf(heard: Heard, output: string | undefined): string {
  switch (heard) {
    case 'ideal':
      return 'the ideal curve';
    case 'table':
      return 'the quantised table';
    case 'ladder':
      return `the table through the ${output === 'ladder' ? 'ladder' : 'converter'}`;
    case 'output':
      return 'the table after the output stage';
  }
}
