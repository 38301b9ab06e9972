/** A RIFF WAVE file of interleaved samples −1…1, byte by byte as the format has it. */
export function wavOf(
  values: readonly number[] | Float64Array,
  {
    bits,
    isFloat,
    channels,
    sampleRateHz,
  }: { bits: 8 | 16 | 24 | 32 | 64; isFloat: boolean; channels: number; sampleRateHz: number },
): Uint8Array<ArrayBuffer> {
  const size = bits / 8;
  const file = new Uint8Array(44 + values.length * size);
  const view = new DataView(file.buffer);
  const tag = (at: number, text: string) => file.set(new TextEncoder().encode(text), at);
  tag(0, 'RIFF');
  view.setUint32(4, file.length - 8, true);
  tag(8, 'WAVEfmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, isFloat ? 3 : 1, true);
  view.setUint16(22, channels, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, sampleRateHz * channels * size, true);
  view.setUint16(32, channels * size, true);
  view.setUint16(34, bits, true);
  tag(36, 'data');
  view.setUint32(40, values.length * size, true);
  values.forEach((value, i) => {
    const at = 44 + i * size;
    const whole = Math.round(value * 2 ** (bits - 1));
    if (isFloat && bits === 32) view.setFloat32(at, value, true);
    else if (isFloat) view.setFloat64(at, value, true);
    else if (bits === 8) view.setUint8(at, whole + 128);
    else for (let k = 0; k < size; k += 1) view.setUint8(at + k, Math.floor(whole / 2 ** (8 * k)) & 255);
  });
  return file;
}

/** A steady tone; the k-th partial has its amplitude and phase in degrees. What lies above half the rate is left out. */
export function toneOf({
  frequencyHz,
  sampleRateHz,
  seconds,
  partials,
}: {
  frequencyHz: number;
  sampleRateHz: number;
  seconds: number;
  partials: readonly (readonly [amplitude: number, phaseDeg: number])[];
}): Float64Array {
  const samples = new Float64Array(Math.floor(seconds * sampleRateHz));
  partials.forEach(([amplitude, phaseDeg], index) => {
    const step = (2 * Math.PI * (index + 1) * frequencyHz) / sampleRateHz;
    if (step >= Math.PI) return;
    const phase = (phaseDeg * Math.PI) / 180;
    for (let i = 0; i < samples.length; i += 1)
      samples[i] += (amplitude / (index + 1)) * Math.sin(step * i + phase);
  });
  return samples;
}
