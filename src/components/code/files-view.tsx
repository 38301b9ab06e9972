import type { ReactNode } from 'react';
import type { GeneratedFile } from '../../../shared/contract/index.ts';
import { readableContent } from '../../../shared/firmware/index.ts';
import { Button } from '../button.tsx';
import { icons } from '../icons.tsx';
import { TabPanel, TabRow } from '../tab-row.tsx';
import { CodeView } from './code-view.tsx';
import { useCopy } from './use-copy.ts';

export interface FilesViewProps {
  files: readonly GeneratedFile[];
  /** Name of the file in sight; the first where there is none of that name. */
  selected: string;
  onSelect: (name: string) => void;
  /** Ways to download the file in sight, and all of them. */
  downloads: (shown: GeneratedFile) => ReactNode;
}

/** Generated files to read, copy and download, one in sight at a time. */
export function FilesView({ files, selected, onSelect, downloads }: FilesViewProps) {
  const copy = useCopy();
  const shown = files.find(({ name }) => name === selected) ?? files[0];
  return (
    <>
      <div>
        <TabRow
          label="Generated files"
          group="export"
          tabs={files.map((file) => ({ id: file.name, label: file.name }))}
          selected={shown.name}
          onSelect={onSelect}
        />
        <TabPanel id={shown.name} group="export">
          <CodeView name={shown.name} text={readableContent(shown)} />
        </TabPanel>
      </div>
      <div className="flex flex-wrap gap-2">
        <Button size="small" icon={icons.copy} onPress={() => void copy(readableContent(shown), shown.name)}>
          Copy {shown.name}
        </Button>
        {downloads(shown)}
      </div>
    </>
  );
}
