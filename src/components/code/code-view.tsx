import { cpp } from '@codemirror/lang-cpp';
import { EditorView, lineNumbers } from '@codemirror/view';
import CodeMirror from '@uiw/react-codemirror';
import { useMemo } from 'react';
import { codeLook } from './code-look.ts';

/** A generated file to read, select and copy from. It takes the focus and the caret, but no changes. */
export function CodeView({ name, text }: { name: string; text: string }) {
  const extensions = useMemo(() => extensionsFor(name), [name]);
  return (
    <CodeMirror
      // Each file is scrolled on its own.
      key={name}
      className="code-view"
      value={text}
      extensions={extensions}
      theme="none"
      basicSetup={false}
      indentWithTab={false}
      readOnly
    />
  );
}

const extensionsFor = (name: string) => [
  EditorView.contentAttributes.of({ 'aria-label': `${name}, read-only`, spellcheck: 'false', tabindex: '0' }),
  lineNumbers(),
  // The one grammar that is loaded: other languages are shown plain rather than wrongly coloured.
  ...(/\.(?:c|h|hpp)$/.test(name) ? [cpp()] : []),
  codeLook(),
];
