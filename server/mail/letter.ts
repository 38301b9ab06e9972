/** A mail as data. Text that a person typed goes in by way of `quoted` or, in the subject, `plain`. */
export interface Letter {
  readonly subject: string;
  readonly paragraphs: readonly string[];
  /** The one thing to do, with its address. */
  readonly action?: { readonly label: string; readonly url: string };
  /** Said after the action, such as how long it works. */
  readonly afterwards?: readonly string[];
  /** Said at the very end, with an address of its own: how to get no more of these. */
  readonly last?: { readonly words: string; readonly url: string };
}

export interface WrittenLetter {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** On one line, without control and invisible formatting characters: they could end a header or turn text round. */
const oneLine = (text: string) => text.replace(/[\p{C}\p{Zl}\p{Zp}\s]+/gu, ' ').trim();

/**
 * Text that a person typed, for use inside a paragraph: mail programs must not make a link out of it, since it comes
 * from us and was chosen by somebody else.
 */
export const quoted = (typed: string) => `“${oneLine(typed).replace(/[.:@/\\](?=\S)/g, '$&\u2060')}”`;

/** Text that a person typed, for the subject, where nothing becomes a link. */
export const plain = (typed: string) => oneLine(typed);

const escapes: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (character) => escapes[character]);

const signature = 'Stepwell sends this because of something done at its address; nobody reads answers to it.';

/** Writes a letter out as plain text and as HTML, where every text is escaped. */
export function writeLetter({ subject, paragraphs, action, afterwards = [], last }: Letter): WrittenLetter {
  const after = [...afterwards, signature];
  const text = [
    ...paragraphs,
    ...(action ? [`${action.label}:\n${action.url}`] : []),
    ...after,
    ...(last ? [`${last.words}\n${last.url}`] : []),
  ].join('\n\n');
  const html = [
    '<!doctype html><html lang="en"><head><meta charset="utf-8"><title>Stepwell</title></head>',
    '<body style="font-family:sans-serif;line-height:1.5;max-width:36em">',
    ...paragraphs.map((line) => `<p>${escapeHtml(line)}</p>`),
    ...(action
      ? [
          `<p><a href="${escapeHtml(action.url)}">${escapeHtml(action.label)}</a></p>`,
          `<p>${escapeHtml(action.url)}</p>`,
        ]
      : []),
    ...after.map((line) => `<p>${escapeHtml(line)}</p>`),
    ...(last
      ? [`<p>${escapeHtml(last.words)}<br><a href="${escapeHtml(last.url)}">${escapeHtml(last.url)}</a></p>`]
      : []),
    '</body></html>',
  ].join('');
  return { subject: oneLine(subject).slice(0, 200), text: `${text}\n`, html };
}
