import { cpp } from '@codemirror/lang-cpp';
import { HighlightStyle, syntaxHighlighting } from '@codemirror/language';
import { EditorState } from '@codemirror/state';
import { EditorView, lineNumbers } from '@codemirror/view';
import { tags } from '@lezer/highlight';
import { useEffect, useRef } from 'react';

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
  const place = useRef<HTMLDivElement>(null);
  const view = useRef<EditorView | null>(null);

  useEffect(() => {
    if (place.current === null) return;
    const opened = new EditorView({ parent: place.current, state: stateFor('', '') });
    view.current = opened;
    return () => {
      opened.destroy();
      view.current = null;
    };
  }, []);

  useEffect(() => {
    const shown = view.current;
    if (shown === null) return;
    const { scrollTop } = shown.scrollDOM;
    shown.setState(stateFor(name, text));
    shown.scrollDOM.scrollTop = scrollTop;
  }, [name, text]);

  return <div ref={place} className="code-view" />;
}

function stateFor(name: string, text: string): EditorState {
  return EditorState.create({
    doc: text,
    extensions: [
      EditorView.cspNonce.of(nonceOfPage()),
      EditorState.readOnly.of(true),
      EditorView.contentAttributes.of({
        'aria-label': `${name}, read-only`,
        spellcheck: 'false',
        tabindex: '0',
      }),
      lineNumbers(),
      cpp(),
      syntaxHighlighting(colours),
      theme,
    ],
  });
}
