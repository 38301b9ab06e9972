/** Codes as they are stored: 16-bit words, low byte first, whatever the machine's own order is. */
export function packCodes(codes: ArrayLike<number>): Buffer {
  const packed = Buffer.alloc(2 * codes.length);
  for (let k = 0; k < codes.length; k += 1) packed.writeUInt16LE(codes[k], 2 * k);
  return packed;
}

export function unpackCodes(packed: Buffer): Uint16Array {
  const codes = new Uint16Array(packed.length / 2);
  for (let k = 0; k < codes.length; k += 1) codes[k] = packed.readUInt16LE(2 * k);
  return codes;
}
