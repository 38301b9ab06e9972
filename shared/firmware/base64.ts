const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
const values = new Map(Array.from(letters, (letter, value) => [letter, value]));

/** Bytes in base64 with its padding (RFC 4648 §4). */
export function toBase64(bytes: Uint8Array): string {
  const groups: string[] = [];
  for (let k = 0; k < bytes.length; k += 3) {
    const left = Math.min(3, bytes.length - k);
    const group = (bytes[k] << 16) | ((bytes[k + 1] ?? 0) << 8) | (bytes[k + 2] ?? 0);
    const four = [18, 12, 6, 0].map((shift) => letters[(group >> shift) & 63]).join('');
    groups.push(four.slice(0, left + 1).padEnd(4, '='));
  }
  return groups.join('');
}

/** The bytes again; for what `toBase64` has written. */
export function fromBase64(text: string): Uint8Array {
  const bare = text.replace(/=+$/, '');
  const bytes = new Uint8Array(Math.floor((bare.length * 3) / 4));
  let group = 0;
  for (let k = 0, at = 0; k < bare.length; k += 1) {
    group = ((group << 6) | (values.get(bare[k]) ?? 0)) & 0xffffff;
    if (k % 4 !== 0) bytes[at++] = (group >> (6 - 2 * (k % 4))) & 0xff;
  }
  return bytes;
}
