import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { Original, OriginalKind } from '../../../shared/contract/index.ts';
import { originalAddress, originalQueries, removeOriginal, type RevisionPlace } from '../../api/originals.ts';
import { asProblem } from '../../api/problem-error.ts';
import { Button, Moment } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';

const kindWords: Readonly<Record<OriginalKind, string>> = {
  recording: 'recording',
  columns: 'columns of numbers',
  c: 'C or C++ source',
  assembly: 'assembly source',
  'intel-hex': 'Intel HEX image',
};

interface OriginalsSectionProps {
  at: RevisionPlace;
  mayRemove: boolean;
}

/** The files that a revision was made from; nothing where it was made on the bench alone. */
export function OriginalsSection({ at, mayRemove }: OriginalsSectionProps) {
  const { data, error } = useQuery(originalQueries.list(at));
  if (error) return <ProblemNotice fault={asProblem(error)} />;
  if (data === undefined || data.items.length === 0) return null;
  return (
    <section className="space-y-2" aria-labelledby="originals">
      <h3 id="originals">Made from</h3>
      <ul className="space-y-1">
        {data.items.map((original) => (
          <OriginalRow key={original.id} {...{ at, original, mayRemove }} />
        ))}
      </ul>
    </section>
  );
}

function OriginalRow({ at, original, mayRemove }: OriginalsSectionProps & { original: Original }) {
  const queryClient = useQueryClient();
  const removing = useSubmit(async () => {
    await removeOriginal(at, original.id);
    await queryClient.invalidateQueries({ queryKey: originalQueries.list(at).queryKey });
  });
  return (
    <li className="break-words">
      <a href={originalAddress(at, original.id)} download={original.name}>
        {original.name}
      </a>
      , {kindWords[original.kind]}, {Math.ceil(original.bytes / 1024).toLocaleString('en')} KiB, kept{' '}
      <Moment at={original.keptAt} /> by {original.keptBy.name}{' '}
      {mayRemove && (
        <Button
          size="small"
          variant="quiet"
          isDisabled={removing.isBusy}
          aria-label={`Remove the file ${original.name}`}
          onPress={() => void removing.submit(undefined)}
        >
          Remove
        </Button>
      )}
      <ProblemNotice fault={removing.fault} />
    </li>
  );
}
