/** Data bytes in a record. */
const recordBytes = 16;

/**
 * Bytes as Intel HEX with 32-bit addresses: data records, a record of the upper address before the first of each
 * 64 KiB, and the end-of-file record. Lines end in LF; the last has no line end.
 *
 * @param address of the first byte, 0 to 2³² − 1 less the bytes
 */
export function intelHex(bytes: Uint8Array, address: number): string {
  const lines: string[] = [];
  let upper = 0;
  for (let start = 0; start < bytes.length;) {
    const at = address + start;
    if (Math.floor(at / 0x10000) !== upper) {
      upper = Math.floor(at / 0x10000);
      lines.push(record(0, 4, [upper >> 8, upper & 0xff]));
    }
    // A record does not run over the end of its 64 KiB: the address in it would wrap.
    const count = Math.min(recordBytes, bytes.length - start, 0x10000 - (at % 0x10000));
    lines.push(record(at % 0x10000, 0, bytes.subarray(start, start + count)));
    start += count;
  }
  lines.push(record(0, 1, []));
  return lines.join('\n');
}

const hexBytes = Array.from({ length: 256 }, (_, byte) => byte.toString(16).toUpperCase().padStart(2, '0'));

function record(address: number, type: number, data: ArrayLike<number>): string {
  const head = [data.length, address >> 8, address & 0xff, type];
  let sum = 0;
  let text = ':';
  for (const byte of head) {
    sum += byte;
    text += hexBytes[byte];
  }
  for (let k = 0; k < data.length; k += 1) {
    sum += data[k];
    text += hexBytes[data[k]];
  }
  return text + hexBytes[-sum & 0xff];
}
