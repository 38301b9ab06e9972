import { createMidiReader, type MidiEvent } from '../../shared/listening/index.ts';

export interface MidiInputs {
  /** Inputs that are there now, in the browser's order. */
  readonly inputs: readonly { readonly id: string; readonly name: string }[];
  /** Lets all of them go; nothing is told afterwards. */
  close(): void;
}

export interface MidiListener {
  /** What an input says. */
  readonly onEvent: (inputId: string, event: MidiEvent) => void;
  /** An input was plugged in or taken away. */
  readonly onInputs: (inputs: MidiInputs['inputs']) => void;
  /** An input went, with whatever it held. */
  readonly onGone: (inputId: string) => void;
}

const insecure =
  'Browsers give MIDI to pages over https only. This page came over plain http: ask whoever runs it for its https address.';
const absent = 'This browser has no MIDI. The keys on the screen and the letter keys play all the same.';
const refused =
  'The browser has refused MIDI to this page. Allow it in the settings of this site, then press again.';
const failed = 'The browser could not open MIDI: the system may have none, or another program may hold it.';

/**
 * Opens every MIDI input (Web MIDI API, W3C), those too that are plugged in later. The browser may ask the person first,
 * so it belongs in the handler of a press.
 *
 * @throws Error in words for the screen
 */
export async function openMidi({ onEvent, onInputs, onGone }: MidiListener): Promise<MidiInputs> {
  if (typeof navigator.requestMIDIAccess !== 'function') throw new Error(isSecureContext ? absent : insecure);
  let access: MIDIAccess;
  try {
    access = await navigator.requestMIDIAccess({ sysex: false });
  } catch (error) {
    const isRefused = error instanceof DOMException && /^(NotAllowed|Security)Error$/.test(error.name);
    throw new Error(isRefused ? refused : failed, { cause: error });
  }

  const open = new Map<string, MIDIInput>();
  const there = () =>
    [...open.values()].map(({ id, name, manufacturer }) => ({
      id,
      name: name?.trim() || manufacturer?.trim() || 'Unnamed input',
    }));
  const attend = () => {
    const connected = [...access.inputs.values()].filter(({ state }) => state === 'connected');
    for (const [id, input] of open) {
      if (connected.includes(input)) continue;
      input.onmidimessage = null;
      open.delete(id);
      onGone(id);
    }
    for (const input of connected) {
      if (open.has(input.id)) continue;
      open.set(input.id, input);
      const read = createMidiReader();
      // Setting it opens the input.
      input.onmidimessage = ({ data }) => {
        if (data === null) return;
        for (const event of read(data)) onEvent(input.id, event);
      };
    }
  };
  attend();
  access.onstatechange = () => {
    attend();
    onInputs(there());
  };
  return {
    inputs: there(),
    close() {
      access.onstatechange = null;
      for (const input of open.values()) {
        input.onmidimessage = null;
        void input.close().catch(() => undefined);
      }
      open.clear();
    },
  };
}
