import { useId, useRef, useState, type DragEvent } from 'react';
import { Button, TextField } from '../../../components/index.ts';
import type { Chosen } from './chosen.ts';
import { filesOf } from './dropped-files.ts';

interface StartViewProps {
  pasted: string;
  onType: (text: string) => void;
  onChoose: (chosen: Chosen) => void;
  onChooseMany: (files: readonly File[]) => void;
}

/** Where it begins: drop or choose files, choose a folder, or paste text. */
export function StartView({ pasted, onType, onChoose, onChooseMany }: StartViewProps) {
  const [isOver, setOver] = useState(false);
  const fileInput = useRef<HTMLInputElement>(null);
  const folderInput = useRef<HTMLInputElement>(null);
  const id = useId();

  const take = (files: readonly File[]) => {
    if (files.length === 1) onChoose({ name: files[0].name, file: files[0], text: '' });
    else if (files.length > 1) onChooseMany(files);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    void filesOf(event.dataTransfer).then(take);
  };

  return (
    <div className="space-y-4">
      <section
        className="drop-place"
        data-over={isOver || undefined}
        aria-labelledby={`${id}-title`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        <p id={`${id}-title`}>
          Drop files here: recordings (RIFF WAVE), columns of numbers, C or assembly source with arrays, Intel
          HEX.
        </p>
        <input
          ref={fileInput}
          id={`${id}-files`}
          className="sr-only"
          type="file"
          multiple
          tabIndex={-1}
          aria-label="Files to bring in"
          onChange={({ target }) => take(Array.from(target.files ?? []))}
        />
        <input
          ref={(input) => {
            folderInput.current = input;
            // React knows no property of this name; every browser knows the attribute.
            input?.setAttribute('webkitdirectory', '');
          }}
          className="sr-only"
          type="file"
          tabIndex={-1}
          aria-label="Folder to bring in"
          onChange={({ target }) => onChooseMany(Array.from(target.files ?? []))}
        />
        <div className="form-actions">
          <Button variant="primary" onPress={() => fileInput.current?.click()}>
            Choose files
          </Button>
          <Button onPress={() => folderInput.current?.click()}>Choose a folder</Button>
        </div>
        <p className="quiet">
          Files are read on this device. One at a time can be looked at closely; several become drafts.
        </p>
      </section>
      <TextField
        label="Or paste text"
        description="An array out of some source, a list of numbers, or columns."
        multiline
        isCode
        value={pasted}
        onChange={onType}
      />
      <Button
        isDisabled={pasted.trim() === ''}
        disabledReason="Nothing has been pasted"
        onPress={() => onChoose({ name: 'pasted text', file: null, text: pasted })}
      >
        Read the text
      </Button>
    </div>
  );
}
