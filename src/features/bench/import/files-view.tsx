import { useEffect, useRef, useState } from 'react';
import { includesRole, parseDefinition } from '../../../../shared/contract/index.ts';
import { importLimits, type ImportDraft } from '../../../../shared/imports/index.ts';
import { useAccount } from '../../../api/account-state.ts';
import { useCurrentTeam } from '../../../api/current-team.ts';
import { newKey } from '../../../api/new-key.ts';
import { keepOriginal } from '../../../api/originals.ts';
import { createTable, type TaggedTable } from '../../../api/tables.ts';
import { Button, Notice } from '../../../components/index.ts';
import type { ImportsWorker } from '../../../workers/imports-client.ts';
import { theBench } from '../state/use-bench.ts';
import type { Brought } from './put-on-bench.ts';
import { faultsOf } from './use-imports.ts';

interface FilesViewProps {
  files: readonly File[];
  worker: ImportsWorker;
  onPut: (brought: Brought) => void;
}

interface FoundDraft extends ImportDraft {
  readonly file: File;
  readonly saved: 'no' | 'saving' | 'yes';
  readonly fault: string | null;
  /** Of the request that saves it: sent again, it is done once. */
  readonly key: string;
}

interface RefusedFile {
  readonly name: string;
  readonly faults: readonly string[];
}

const pathOf = (file: File) => file.webkitRelativePath || file.name;

/** Many files at once: what each becomes, what is refused and why; then all of it saved as drafts. */
export function FilesView({ files, worker, onPut }: FilesViewProps) {
  const { drafts, refused, readCount, setDrafts } = useDrafts(files, worker);
  const { isSaving, save, stop } = useSaving(drafts, setDrafts);
  const account = useAccount();
  const team = useCurrentTeam();
  const maySave = team !== undefined && includesRole(team.role, 'author');
  const left = drafts.filter(({ saved }) => saved !== 'yes').length;
  const isRead = readCount === files.length;

  return (
    <div className="space-y-4">
      <h3>{files.length} files</h3>
      <p role="status">
        {isRead
          ? `${drafts.length} drafts found, ${refused.length} ${refused.length === 1 ? 'file' : 'files'} refused.`
          : `Reading file ${readCount + 1} of ${files.length} …`}
      </p>
      {refused.length > 0 && (
        <section aria-label="Refused files">
          <h4>Refused</h4>
          <ul className="import-list">
            {refused.map(({ name, faults }) => (
              <li key={name} className="break-words">
                <strong>{name}</strong>: {faults[0]}
              </li>
            ))}
          </ul>
        </section>
      )}
      {drafts.length > 0 && (
        <section aria-label="Drafts">
          <h4>Drafts</h4>
          <ul className="import-list">
            {drafts.map((draft, index) => (
              <li key={index} className="break-words">
                <strong>{draft.definition.name}</strong>, {draft.words}, from {pathOf(draft.file)}
                {draft.saved === 'saving' && ': saving …'}
                {draft.saved === 'yes' && ': saved'}
                {draft.fault !== null &&
                  `: ${draft.saved === 'yes' ? 'the file itself is not kept' : 'not saved'}, ${draft.fault}`}{' '}
                {draft.saved === 'no' && (
                  <Button size="small" variant="quiet" onPress={() => onPut(draft)}>
                    Put {draft.definition.name} on the bench
                  </Button>
                )}
              </li>
            ))}
          </ul>
        </section>
      )}
      {isRead && drafts.length > 0 && !maySave && (
        <Notice
          title={
            account ? 'There is no team that you may save for.' : 'Drafts are saved to a team’s library.'
          }
        >
          {account
            ? 'Saving takes the role author.'
            : 'Sign in first; one draft at a time goes on the bench without.'}
        </Notice>
      )}
      {isRead && maySave && left > 0 && (
        <Button
          variant="primary"
          isDisabled={isSaving}
          disabledReason="They are being saved"
          onPress={() => void save(team.teamSlug)}
        >
          Save {left} drafts in {team.teamName}
        </Button>
      )}
      {isSaving && <Button onPress={stop}>Stop</Button>}
    </div>
  );
}

/** Reads the files one after the other. */
function useDrafts(files: readonly File[], worker: ImportsWorker) {
  const [drafts, setDrafts] = useState<readonly FoundDraft[]>([]);
  const [refused, setRefused] = useState<readonly RefusedFile[]>([]);
  const [readCount, setReadCount] = useState(0);
  useEffect(() => {
    let isOver = false;
    void (async () => {
      const found: FoundDraft[] = [];
      const wrong: RefusedFile[] = [];
      for (const [index, file] of files.entries()) {
        try {
          if (index >= importLimits.files) throw new Error(`At most ${importLimits.files} files at once.`);
          if (file.size > importLimits.fileBytes)
            throw new Error(`It is larger than ${importLimits.fileBytes} bytes.`);
          const bytes = new Uint8Array(await file.arrayBuffer());
          for (const draft of await worker.run('drafts', { bytes, name: file.name })) {
            found.push({ ...draft, file, saved: 'no', fault: null, key: newKey() });
          }
        } catch (error) {
          wrong.push({ name: pathOf(file), faults: faultsOf(error) });
        }
        if (isOver) return;
        setDrafts([...found]);
        setRefused([...wrong]);
        setReadCount(index + 1);
      }
    })();
    return () => {
      isOver = true;
    };
  }, [files, worker]);
  return { drafts, refused, readCount, setDrafts };
}

/** Saves the drafts one after the other, each with the file it came from; what fails is told beside it. */
function useSaving(
  drafts: readonly FoundDraft[],
  setDrafts: (update: (before: readonly FoundDraft[]) => readonly FoundDraft[]) => void,
) {
  const [isSaving, setSaving] = useState(false);
  const isStopped = useRef(false);
  useEffect(() => () => void (isStopped.current = true), []);
  const change = (index: number, part: Partial<FoundDraft>) =>
    setDrafts((before) => before.map((draft, k) => (k === index ? { ...draft, ...part } : draft)));

  const save = async (team: string) => {
    isStopped.current = false;
    setSaving(true);
    const { playback } = theBench().getState().history.present;
    for (const [index, { definition, toneHz, file, saved, key }] of drafts.entries()) {
      if (isStopped.current) break;
      if (saved === 'yes') continue;
      change(index, { saved: 'saving', fault: null });
      try {
        const parsed = parseDefinition(definition);
        const body = {
          title: parsed.name,
          tags: ['brought in'],
          note: `From ${pathOf(file)}.`.slice(0, 2_000),
          definition: parsed,
          playback:
            toneHz === undefined
              ? playback
              : { ...playback, mode: 'loop' as const, by: 'tone' as const, toneHz },
        };
        const table = await createTable(team, body, key);
        change(index, { saved: 'yes', fault: await faultOfKeeping(team, table, file) });
      } catch (error) {
        change(index, { saved: 'no', fault: faultsOf(error)[0] });
      }
    }
    setSaving(false);
  };
  return { isSaving, save, stop: () => void (isStopped.current = true) };
}

/** The table is saved by then: that its file is not kept is told, and no reason to save it again. */
async function faultOfKeeping(
  team: string,
  { slug, latestRevision }: TaggedTable,
  file: File,
): Promise<string | null> {
  try {
    await keepOriginal({ team, table: slug, number: latestRevision }, file);
    return null;
  } catch (error) {
    return faultsOf(error)[0];
  }
}
