const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
const values = new Map(Array.from(letters, (letter, value) => [letter, value]));

/** Two letters for 12 bits. */
const pairs = Array.from({ length: 4096 }, (_, bits) => letters[bits >> 6] + letters[bits & 63]);

/** Bytes in base64 with its padding (RFC 4648 §4). */
export function toBase64(bytes: Uint8Array): string {
  const whole = bytes.length - (bytes.length % 3);
  let text = '';
  for (let k = 0; k < whole; k += 3) {
    text += pairs[(bytes[k] << 4) | (bytes[k + 1] >> 4)];
    text += pairs[((bytes[k + 1] & 15) << 8) | bytes[k + 2]];
  }
  if (bytes.length - whole === 1) text += `${pairs[bytes[whole] << 4]}==`;
  if (bytes.length - whole === 2) {
    text += pairs[(bytes[whole] << 4) | (bytes[whole + 1] >> 4)];
    text += `${letters[(bytes[whole + 1] & 15) << 2]}=`;
  }
  return text;
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
