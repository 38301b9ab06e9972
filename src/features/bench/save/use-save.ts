import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { z } from 'zod';
import { checkDefinition, type Definition } from '../../../../shared/contract/index.ts';
import { asProblem } from '../../../api/problem-error.ts';
import { tableQueries, type TaggedTable } from '../../../api/tables.ts';
import { useToast } from '../../../components/index.ts';
import { requireAllowed } from '../../../forms/require-allowed.ts';
import { useSubmit } from '../../../forms/use-submit.ts';
import { tablePath } from '../../../paths.ts';
import { theBench } from '../state/use-bench.ts';
import type { Playback } from '../state/wave.ts';
import { emptyDraft, readDraft, withKey, writeDraft, type SaveDraft } from './save-draft.ts';
import { theSavedLinks } from './use-saved-links.ts';

interface SaveParts {
  schema: z.ZodType;
  onClose: () => void;
  onFault: (fault: string | null) => void;
}

interface Sending<Body> {
  /** Tells this request's address from others'. */
  place: string;
  send: (body: Body, key: string) => Promise<TaggedTable>;
  linkTo: { readonly team: string; readonly teamName: string };
}

/** What is sent of the bench. */
export interface SentWave {
  definition: Definition;
  playback: Playback;
}

/** Carries the wave on the bench to the library. Until it has got through, all that was typed is kept. */
export function useSave({ schema, onClose, onFault }: SaveParts) {
  const [draft, setDraft] = useState(readDraft);
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const toast = useToast();
  const keep = (next: SaveDraft) => {
    setDraft(next);
    writeDraft(next);
  };
  const saving = useSubmit(async (act: () => Promise<void>) => {
    try {
      await act();
      onFault(null);
    } catch (error) {
      onFault(asProblem(error).message);
      throw error;
    }
  });

  const save = async <Body extends { note: string }>(
    bodyOf: (wave: SentWave, note: string) => Body,
    { place, send, linkTo }: Sending<Body>,
  ) => {
    const work = theBench().getState().history.present;
    const checked = checkDefinition(work.definition);
    if ('problems' in checked) return;
    const body = bodyOf({ definition: checked.definition, playback: work.playback }, draft.note);
    const act = async () => {
      requireAllowed(schema, body);
      const keyed = await withKey(draft, [place, body]);
      keep(keyed.draft);
      const table = await send(body, keyed.key);
      const { slug, title, latestRevision, etag } = table;
      theSavedLinks().markSaved(
        { ...linkTo, table: slug, title, revision: latestRevision, newest: latestRevision, etag },
        work,
      );
      void keepOriginalOf(linkTo.team, slug, latestRevision);
      keep({ ...emptyDraft, team: linkTo.team });
      queryClient.setQueryData(tableQueries.detail(linkTo.team, slug).queryKey, table);
      void queryClient.invalidateQueries({ queryKey: tableQueries.all(linkTo.team) });
      onClose();
      toast({
        message: `Saved as revision ${latestRevision} of ${title}.`,
        tone: 'good',
        action: { label: 'Show it', onPress: () => void navigate(tablePath(linkTo.team, slug)) },
      });
    };
    await saving.submit(act);
  };

  /** The revision is saved whatever becomes of this; a file that is not kept is told. */
  const keepOriginalOf = async (team: string, slug: string, revision: number) => {
    const file = await theSavedLinks().takeOriginal();
    if (file === null) return;
    try {
      const { keepOriginal } = await import('../../../api/originals.ts');
      await keepOriginal({ team, table: slug, number: revision }, file);
    } catch (error) {
      // The next revision takes it along.
      theSavedLinks().giveBackOriginal(file);
      toast({
        message: `The revision is saved, but not ${file.name} with it: ${asProblem(error).message}`,
        tone: 'fault',
      });
    }
  };

  return { draft, type: (part: Partial<SaveDraft>) => keep({ ...draft, ...part }), saving, save };
}
