import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense, useState } from 'react';
import type { TeamDefaults } from '../../../shared/contract/index.ts';
import { targets } from '../../../shared/firmware/index.ts';
import { asProblem } from '../../api/problem-error.ts';
import { exportedFile, tableQueries, type ExportAsk } from '../../api/tables.ts';
import { Button, Panel, SelectField, Waiting, icons } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSettled } from '../../components/use-settled.ts';

const FilesView = lazy(async () => ({ default: (await import('../../components/code/index.ts')).FilesView }));
const OptionGroups = lazy(async () => ({
  default: (await import('../../components/code/index.ts')).OptionGroups,
}));

interface ExportSectionProps {
  team: string;
  table: string;
  number: number;
  defaults: TeamDefaults;
}

/** Typing rests so long before files are asked for, in milliseconds. */
const restMs = 300;

/** Files of a saved revision, as the server makes them of what was stored. */
export function ExportSection(props: ExportSectionProps) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <Panel
      title={`Export revision ${props.number}`}
      actions={
        !isOpen && (
          <Button icon={icons.file} onPress={() => setIsOpen(true)}>
            Show the files
          </Button>
        )
      }
    >
      {isOpen ? (
        <Suspense fallback={<Waiting>Opening the export…</Waiting>}>
          <Export {...props} />
        </Suspense>
      ) : (
        <p className="quiet">
          Made of the stored codes: the same bytes for the same request, today and later.
        </p>
      )}
    </Panel>
  );
}

function Export({ team, table, number, defaults }: ExportSectionProps) {
  const known = targets.find(({ id }) => id === defaults.target) ?? targets[0];
  const [target, setTarget] = useState(known);
  const [typed, setTyped] = useState<Record<string, string>>({});
  const [selected, setSelected] = useState('');
  const given = Object.entries(typed).filter(([name, value]) => value !== '' && name in target.options.shape);
  const query = useSettled(String(new URLSearchParams([['target', target.id], ...given])), restMs);
  const wanted: ExportAsk = { team, table, number, query: Object.fromEntries(new URLSearchParams(query)) };
  const { data: files, error, refetch, isPlaceholderData } = useQuery(tableQueries.export(wanted));
  const fault = error && asProblem(error);
  const problemOf = (name: string) => {
    const problem = fault?.at(name);
    return problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`;
  };
  const standard: Readonly<Record<string, string>> = {
    arrayName: 'made from the wave’s name',
    arrayPrefix: defaults.arrayPrefix || 'none',
    licenceLine: defaults.licenceLine || 'none',
    pulses: 'those kept with the revision, if any',
  };
  return (
    <div className="space-y-4 export-files">
      <div className="space-y-4">
        <SelectField
          label="Target"
          value={target.id}
          options={targets.map(({ id, title }) => ({ value: id, label: title }))}
          onChange={(id) => setTarget(targets.find((one) => one.id === id) ?? target)}
        />
        <OptionGroups
          target={target}
          typed={typed}
          fallbacks={standard}
          problemOf={problemOf}
          onChange={(name, value) => setTyped({ ...typed, [name]: value })}
        />
      </div>
      <ProblemNotice
        fault={fault}
        shownElsewhere={Object.keys(target.options.shape)}
        onTryAgain={() => void refetch()}
      />
      {files === undefined && !fault && <Waiting>The server makes the files…</Waiting>}
      {files !== undefined && !fault && (
        <div aria-busy={isPlaceholderData} className="found space-y-3">
          <FilesView
            files={files}
            selected={selected}
            onSelect={setSelected}
            downloads={(shown) => (
              <>
                {[shown, ...files.filter(({ name }) => name !== shown.name)].map(({ name }) => (
                  <a
                    key={name}
                    href={exportedFile(wanted, name)}
                    download={name}
                    className="button button-plain button-small"
                  >
                    <icons.download width="16" height="16" />
                    Download {name}
                  </a>
                ))}
              </>
            )}
          />
        </div>
      )}
    </div>
  );
}
