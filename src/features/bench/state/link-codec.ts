import { checkDefinition, limits, sayProblem } from '../../../../shared/contract/index.ts';
import { playbackSchema, type Wave } from './wave.ts';

/** First letters of every link of this form; another form of content takes another number. */
const version = 'w1.';

/** Longer links get cut by some mail and chat programs. Common practice, no source. */
export const longLink = 2_000;

/**
 * Writes a wave as the fragment of a link: `w1.` and base64url (RFC 4648 §5) of zlib-deflated (RFC 1950) JSON. The
 * zlib check sum at its end is what tells a cut or altered link from a whole one.
 */
export async function encodeWave({ definition, playback }: Wave): Promise<string> {
  const bytes = new TextEncoder().encode(JSON.stringify({ definition, playback }));
  return version + toBase64Url(await pump(bytes, new CompressionStream('deflate'), Infinity));
}

/** Reads such a fragment, with or without its `#`. What cannot be read is answered in words, never thrown. */
export async function decodeWave(fragment: string): Promise<{ wave: Wave } | { fault: string }> {
  const text = fragment.replace(/^#/, '');
  if (!text.startsWith(version)) {
    return {
      fault: /^w\d+\./.test(text)
        ? 'The link was made by a later version of Stepwell than this one.'
        : 'The link holds no wave: it should have a part that begins with “#w1.”.',
    };
  }
  const packed = fromBase64Url(text.slice(version.length));
  if (packed === null) return { fault: 'The link holds characters that do not belong there.' };
  let content: unknown;
  try {
    const bytes = await pump(packed, new DecompressionStream('deflate'), limits.requestBytes);
    content = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch {
    return { fault: 'The link has been cut or altered on its way: its check sum does not match.' };
  }
  return waveFrom(content);
}

function waveFrom(content: unknown): { wave: Wave } | { fault: string } {
  const { definition, playback } =
    typeof content === 'object' && content !== null ? (content as Record<string, unknown>) : {};
  const checked = checkDefinition(definition);
  if ('problems' in checked) {
    return { fault: `The link’s wave is not one that can be built. ${sayProblem(checked.problems[0])}.` };
  }
  const heard = playbackSchema.safeParse(playback);
  if (!heard.success) return { fault: 'The link’s playback settings are not ones that can be used.' };
  return { wave: { definition: checked.definition, playback: heard.data } };
}

/** Sends bytes through a stream; throws where the stream refuses them or more than `most` bytes come out. */
async function pump(
  bytes: Uint8Array<ArrayBuffer>,
  through: CompressionStream | DecompressionStream,
  most: number,
): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let total = 0;
  const reader = new Blob([bytes]).stream().pipeThrough(through).getReader();
  for (let next = await reader.read(); !next.done; next = await reader.read()) {
    total += next.value.length;
    if (total > most) {
      await reader.cancel();
      throw new RangeError(`more than ${most} bytes`);
    }
    chunks.push(next.value);
  }
  const whole = new Uint8Array(total);
  let at = 0;
  for (const chunk of chunks) {
    whole.set(chunk, at);
    at += chunk.length;
  }
  return whole;
}

function toBase64Url(bytes: Uint8Array): string {
  let binary = '';
  for (const byte of bytes) binary += String.fromCharCode(byte);
  return btoa(binary).replaceAll('+', '-').replaceAll('/', '_').replaceAll('=', '');
}

function fromBase64Url(text: string): Uint8Array<ArrayBuffer> | null {
  if (!/^[\w-]*$/.test(text) || text.length % 4 === 1) return null;
  return Uint8Array.from(atob(text.replaceAll('-', '+').replaceAll('_', '/')), (char) => char.charCodeAt(0));
}
