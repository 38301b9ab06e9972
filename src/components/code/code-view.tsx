import { cpp } from '@codemirror/lang-cpp';
import { HighlightStyle, syntaxHighlighting } from '@codemirror/language';
import { EditorView, lineNumbers } from '@codemirror/view';
import { tags } from '@lezer/highlight';
import CodeMirror from '@uiw/react-codemirror';
import { useMemo } from 'react';

const theme = EditorView.theme({
  '&': { color: 'var(--ink)', backgroundColor: 'var(--raised)', fontSize: '0.8125rem' },
  '&.cm-focused': { outline: '3px solid var(--focus)', outlineOffset: '-3px' },
  '.cm-scroller': {
    fontFamily: 'var(--font-mono)',
    fontStretch: '80%',
    lineHeight: '1.25rem',
    maxHeight: '24rem',
    overflow: 'auto',
  },
  '.cm-gutters': {
    color: 'var(--ink-soft)',
    backgroundColor: 'var(--panel)',
    borderRight: '1px solid var(--edge)',
  },
  '.cm-content': { caretColor: 'var(--ink)' },
});

const colours = HighlightStyle.define([
  { tag: [tags.comment, tags.blockComment, tags.lineComment], color: 'var(--ink-soft)', fontStyle: 'italic' },
  { tag: [tags.keyword, tags.modifier, tags.controlKeyword], color: 'var(--water)', fontWeight: '650' },
  { tag: [tags.typeName, tags.standard(tags.typeName)], color: 'var(--moss)' },
  { tag: [tags.processingInstruction, tags.meta], color: 'var(--saffron)' },
  { tag: [tags.string, tags.character], color: 'var(--moss)' },
  { tag: tags.number, color: 'var(--brick)' },
]);

/** The page's content policy lets only styles with this nonce in. */
function nonceOfPage(): string {
  return document.querySelector<HTMLMetaElement>('meta[property="csp-nonce"]')?.nonce ?? '';
}

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
  EditorView.cspNonce.of(nonceOfPage()),
  EditorView.contentAttributes.of({ 'aria-label': `${name}, read-only`, spellcheck: 'false', tabindex: '0' }),
  lineNumbers(),
  cpp(),
  syntaxHighlighting(colours),
  theme,
];
