import { paths } from '../../../paths.ts';
import { encodeWave, longLink } from '../state/link-codec.ts';
import type { Wave } from '../state/wave.ts';

/** A link that shows the wave read-only to whoever opens it: the wave itself stands in it, nothing is uploaded. */
export async function linkTo(wave: Wave): Promise<string> {
  return `${location.origin}${paths.sharedWave}#${await encodeWave(wave)}`;
}

/** What to say of a link that was copied. */
export function sayCopied(link: string): string {
  const said = 'Link copied. It carries the wave itself, to be seen and heard but not changed.';
  return link.length <= longLink
    ? said
    : `${said} It is long, ${link.length.toLocaleString('en')} characters: some mail and chat programs cut it.`;
}
