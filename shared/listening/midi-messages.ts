/** What a keyboard says that concerns the tone. Channels 0…15. */
export type MidiEvent =
  /** Velocity 1…127. */
  | { readonly kind: 'on'; readonly channel: number; readonly note: number; readonly velocity: number }
  | { readonly kind: 'off'; readonly channel: number; readonly note: number }
  /** −1…1 of the range that it is given, 0 in the middle. */
  | { readonly kind: 'bend'; readonly channel: number; readonly bend: number }
  /** All notes off, all sound off, a change of mode, or a reset of the system (`null`: on every channel). */
  | { readonly kind: 'all-off'; readonly channel: number | null };

/** Controllers: all sound off, all notes off, and the mode messages, each of which lets all notes go too. */
const quietingControllers: readonly number[] = [120, 123, 124, 125, 126, 127];
/** Reset all controllers: the bend goes to its middle (Recommended Practice RP-015). */
const resetControllers = 121;

const firstSystem = 0xf0;
const firstRealTime = 0xf8;
const systemReset = 0xff;

/**
 * Reads bytes by the MIDI 1.0 Detailed Specification (MIDI Manufacturers Association): running status; note on with
 * velocity 0 is note off; real-time bytes may stand between any others; system messages end running status. What
 * concerns no note is passed over, and so are data bytes that belong to nothing. A message may come in parts.
 */
export function createMidiReader(): (bytes: Iterable<number>) => MidiEvent[] {
  /** Status that the next data bytes belong to; 0 for none. */
  let status = 0;
  let first: number | null = null;
  return (bytes) => {
    const events: MidiEvent[] = [];
    for (const byte of bytes) {
      if (byte >= firstRealTime) {
        // It interrupts nothing.
        if (byte === systemReset) {
          events.push({ kind: 'all-off', channel: null });
          status = 0;
          first = null;
        }
      } else if (byte >= firstSystem) {
        status = 0;
        first = null;
      } else if (byte >= 0x80) {
        status = byte;
        first = null;
      } else if (status === 0) {
        // Data of a system message, or of nothing.
      } else if (hasOneDataByte(status)) {
        // Program change and channel pressure.
      } else if (first === null) {
        first = byte;
      } else {
        const event = eventOf(status, first, byte);
        if (event !== null) events.push(event);
        first = null;
      }
    }
    return events;
  };
}

const hasOneDataByte = (status: number) => status >= 0xc0 && status < 0xe0;

function eventOf(status: number, first: number, second: number): MidiEvent | null {
  const channel = status & 0x0f;
  switch (status & 0xf0) {
    case 0x80:
      return { kind: 'off', channel, note: first };
    case 0x90:
      return second === 0
        ? { kind: 'off', channel, note: first }
        : { kind: 'on', channel, note: first, velocity: second };
    case 0xb0:
      if (first === resetControllers) return { kind: 'bend', channel, bend: 0 };
      return quietingControllers.includes(first) ? { kind: 'all-off', channel } : null;
    case 0xe0:
      return { kind: 'bend', channel, bend: bendOf(first + 128 * second) };
    default:
      return null;
  }
}

/** 14 bits, 8192 in the middle; both ends reach the whole of the range. */
function bendOf(value: number): number {
  const off = value - 8192;
  return off / (off < 0 ? 8192 : 8191);
}
