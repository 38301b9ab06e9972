import { useCallback } from 'react';
import { parseDefinition, type DefinitionInput } from '../../../../shared/contract/index.ts';
import { useToast } from '../../../components/index.ts';
import { theSavedLinks } from '../save/use-saved-links.ts';
import { theBench } from '../state/use-bench.ts';

export interface Brought {
  readonly definition: DefinitionInput;
  /** The tone of a recording: what it is played back at. */
  readonly toneHz?: number | undefined;
  /** The file it came from, kept with its first revision. */
  readonly file: File | null;
}

/** Puts what was brought in on the bench, as one step that undo takes back. */
export function usePutOnBench(onDone: () => void): (brought: Brought) => void {
  const toast = useToast();
  return useCallback(
    ({ definition, toneHz, file }) => {
      const parsed = parseDefinition(definition);
      theSavedLinks().open(
        (work) => ({
          ...work,
          definition: parsed,
          playback:
            toneHz === undefined ? work.playback : { ...work.playback, mode: 'loop', by: 'tone', toneHz },
        }),
        null,
        file,
      );
      onDone();
      toast({
        message: `${parsed.name} is on the bench. What was there comes back with Undo.`,
        action: { label: 'Undo', onPress: theBench().undo },
      });
    },
    [onDone, toast],
  );
}

/** Length and depth of the table on the bench, where they are allowed: a recording is tabulated in those. */
export function benchTable(): DefinitionInput['table'] {
  const { length, bits } = theBench().getState().history.present.definition.table;
  const isAllowed = Number.isInteger(length) && length >= 2 && length <= 65_536 && Number.isInteger(bits);
  return isAllowed && bits >= 1 && bits <= 16 ? { length, bits } : {};
}
