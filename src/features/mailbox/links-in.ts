export interface TextPart {
  readonly text: string;
  /** Where it leads within this application; plain text leads nowhere. */
  readonly path?: string;
}

const loopback = /^(localhost|127\.\d+\.\d+\.\d+|\[::1\])$/;

/**
 * Cuts a text into plain parts and links to this machine's application at `port`. A browser keeps what is on the bench
 * by the name the page was opened under, so a link must not change that name on the way.
 */
export function linksIn(text: string, port: string): TextPart[] {
  const parts: TextPart[] = [];
  let end = 0;
  for (const { 0: found, index } of text.matchAll(/https?:\/\/[^\s<>"]+/g)) {
    const address = found.replace(/[.,;:!?)]+$/, '');
    const path = pathOf(address, port);
    if (path === undefined) continue;
    parts.push({ text: text.slice(end, index) }, { text: address, path });
    end = index + address.length;
  }
  parts.push({ text: text.slice(end) });
  return parts.filter((part) => part.text !== '');
}

function pathOf(address: string, port: string): string | undefined {
  if (!URL.canParse(address)) return undefined;
  const { hostname, port: theirs, pathname, search, hash } = new URL(address);
  return loopback.test(hostname) && theirs === port ? pathname + search + hash : undefined;
}
