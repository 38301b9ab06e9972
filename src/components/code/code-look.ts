import { HighlightStyle, syntaxHighlighting } from '@codemirror/language';
import { EditorView } from '@codemirror/view';
import { tags } from '@lezer/highlight';

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
  '.cm-tooltip': { color: 'var(--ink)', backgroundColor: 'var(--raised)', border: '1px solid var(--line)' },
});

const colours = HighlightStyle.define([
  { tag: [tags.comment, tags.blockComment, tags.lineComment], color: 'var(--ink-soft)', fontStyle: 'italic' },
  { tag: [tags.keyword, tags.modifier, tags.controlKeyword], color: 'var(--water)', fontWeight: '650' },
  { tag: [tags.typeName, tags.standard(tags.typeName)], color: 'var(--moss)' },
  { tag: [tags.processingInstruction, tags.meta], color: 'var(--saffron)' },
  { tag: [tags.string, tags.character], color: 'var(--moss)' },
  { tag: tags.propertyName, color: 'var(--water)' },
  { tag: [tags.bool, tags.null], color: 'var(--saffron)' },
  { tag: tags.number, color: 'var(--brick)' },
]);

/** The page's content policy lets only styles with this nonce in. */
function nonceOfPage(): string {
  return document.querySelector<HTMLMetaElement>('meta[property="csp-nonce"]')?.nonce ?? '';
}

/** How code looks in every editor and view: the application's own colours, under the page's content policy. */
export const codeLook = () => [EditorView.cspNonce.of(nonceOfPage()), syntaxHighlighting(colours), theme];
