import { useDefinition } from '../state/use-bench.ts';
import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';

const TextEditor = later('the text', async () => (await import('./text-editor.tsx')).TextEditor);

/** Stands below the flights: the same wave, as text. */
export function DefinitionText() {
  const kind = useDefinition(({ source }) => source.kind);
  return (
    <div className="definition-text">
      <Recess id="text" title="Definition as JSON" summary={`The whole wave as text: ${kind}, level, table`}>
        <TextEditor />
      </Recess>
    </div>
  );
}
