import './source-text.css';
import { json } from '@codemirror/lang-json';
import { setDiagnostics } from '@codemirror/lint';
import { EditorView } from '@codemirror/view';
import CodeMirror from '@uiw/react-codemirror';
import { useEffect, useMemo } from 'react';
import { codeLook } from '../../../components/code/code-look.ts';
import { useCopy } from '../../../components/code/use-copy.ts';
import { Button, icons } from '../../../components/index.ts';
import { saveText } from '../../../components/save-text.ts';
import { useBench } from '../state/use-bench.ts';
import { diagnosticOf, faultsOf, type TextFault } from './text-faults.ts';
import { useTextSync } from './use-text-sync.ts';

/** More than these are counted, not listed. */
const mostListed = 5;

/**
 * Text typed over a selection is put in here: the browser would give it the looks of what it replaces by an inline
 * style, which the page's content policy refuses. Brackets and quotes go on to be put round the selection.
 */
const typingOver = EditorView.domEventHandlers({
  beforeinput(event, view) {
    const { data, inputType } = event;
    // The editor may not have heard yet of what the page has just selected.
    const [range] = event.getTargetRanges();
    if (inputType !== 'insertText' || data === null || view.composing) return false;
    if (range === undefined || range.collapsed || /^["'[{(]$/.test(data)) return false;
    const from = view.posAtDOM(range.startContainer, range.startOffset);
    const to = view.posAtDOM(range.endContainer, range.endOffset);
    event.preventDefault();
    view.dispatch({
      changes: { from, to, insert: data },
      selection: { anchor: from + view.state.toText(data).length },
      userEvent: 'input.type',
      scrollIntoView: true,
    });
    return true;
  },
});

const extensions = () => [
  json(),
  typingOver,
  EditorView.contentAttributes.of({ 'aria-label': 'Definition as JSON', spellcheck: 'false', tabindex: '0' }),
  EditorView.lineWrapping,
  codeLook(),
];

const setup = {
  drawSelection: false,
  foldGutter: false,
  autocompletion: false,
  highlightActiveLine: false,
  highlightActiveLineGutter: false,
};

/** The whole definition as the command line and the API take it, to be read, typed and pasted. */
export function TextEditor() {
  const sync = useTextSync();
  const { view, reading } = sync;
  const built = useBench(({ problems }) => problems);
  const copy = useCopy();
  const faults = useMemo(() => (view === null ? [] : faultsOf(view, reading, built)), [view, reading, built]);
  useEffect(() => {
    if (view !== null) view.dispatch(setDiagnostics(view.state, faults.map(diagnosticOf)));
  }, [view, faults]);
  const looks = useMemo(() => extensions(), []);
  const text = () => view?.state.doc.toString() ?? '';

  return (
    <div className="space-y-3">
      <p className="field-description">
        What is typed here changes the bench as soon as it is a definition; what changes on the bench shows
        here. The command line and the API take the same text.
      </p>
      <CodeMirror
        className="code-view text-editor"
        value={sync.firstText}
        extensions={looks}
        theme="none"
        basicSetup={setup}
        indentWithTab={false}
        onCreateEditor={sync.onView}
        onUpdate={sync.onUpdate}
      />
      <div role="status">
        {reading.kind !== 'definition' && (
          <p className="text-standing">
            The bench keeps the last definition that could be read.
            {sync.isBehind && ' It has been changed since; the text here is yours and stays.'}
          </p>
        )}
        {faults.length > 0 && (
          <ul className="text-faults" aria-label="Faults in the text">
            {faults.slice(0, mostListed).map((fault) => (
              <li key={`${fault.from} ${fault.message}`}>
                <icons.fault width="16" height="16" />
                <span>
                  <button type="button" className="link" onClick={() => goTo(view, fault)}>
                    Line {fault.line}, column {fault.column}
                  </button>
                  : {fault.message}
                </span>
              </li>
            ))}
            {faults.length > mostListed && <li>And {faults.length - mostListed} more.</li>}
          </ul>
        )}
      </div>
      <div className="flex flex-wrap gap-2">
        {reading.kind !== 'definition' && (
          <Button size="small" onPress={sync.showBench}>
            Show what is on the bench
          </Button>
        )}
        <Button size="small" icon={icons.copy} onPress={() => void copy(text(), 'Definition')}>
          Copy the text
        </Button>
        <Button
          size="small"
          icon={icons.download}
          onPress={() => saveText('definition.json', text(), 'application/json')}
        >
          Download it
        </Button>
      </div>
    </div>
  );
}

function goTo(view: EditorView | null, { from }: TextFault): void {
  if (view === null) return;
  view.dispatch({ selection: { anchor: from }, scrollIntoView: true });
  view.focus();
}
