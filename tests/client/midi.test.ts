import { afterEach, describe, expect, it, vi } from 'vitest';
import { openMidi, type MidiListener } from '../../src/audio/midi.ts';

afterEach(() => vi.unstubAllGlobals());

const nobody: MidiListener = { onEvent: () => undefined, onInputs: () => undefined, onGone: () => undefined };

function browserWith(requestMIDIAccess: unknown, isSecureContext = true): void {
  vi.stubGlobal('navigator', { requestMIDIAccess });
  vi.stubGlobal('isSecureContext', isSecureContext);
}

describe('MIDI of the browser', () => {
  it.each([
    ['is not there', undefined, true, 'This browser has no MIDI.'],
    ['is kept from plain http', undefined, false, 'over https only'],
    ['is refused', () => Promise.reject(new DOMException('', 'NotAllowedError')), true, 'has refused MIDI'],
    [
      'is forbidden by a policy',
      () => Promise.reject(new DOMException('', 'SecurityError')),
      true,
      'has refused',
    ],
    [
      'cannot be opened',
      () => Promise.reject(new DOMException('', 'InvalidStateError')),
      true,
      'could not open',
    ],
  ])('%s: it says so', async (_what, request, isSecure, words) => {
    browserWith(request, isSecure);
    await expect(openMidi(nobody)).rejects.toThrow(words);
  });

  it('names inputs, leaves out those that are not connected, and after closing hears nothing', async () => {
    const input = (id: string, name: string | null, manufacturer: string | null, state = 'connected') => ({
      id,
      name,
      manufacturer,
      state,
      onmidimessage: null as ((event: { data: Uint8Array | null }) => void) | null,
      close: vi.fn(() => Promise.resolve()),
    });
    const all = [input('a', ' Left ', 'Maker'), input('b', '', 'Maker'), input('c', null, null), input('d', 'Away', '', 'disconnected')]; // prettier-ignore
    const access = {
      inputs: new Map(all.map((one) => [one.id, one])),
      onstatechange: null as (() => void) | null,
    };
    browserWith((options: unknown) => {
      expect(options).toEqual({ sysex: false });
      return Promise.resolve(access);
    });
    const told: unknown[] = [];
    const midi = await openMidi({
      onEvent: (id, event) => told.push([id, event]),
      onInputs: (inputs) => told.push(inputs),
      onGone: (id) => told.push([id, 'gone']),
    });
    expect(midi.inputs).toEqual([
      { id: 'a', name: 'Left' },
      { id: 'b', name: 'Maker' },
      { id: 'c', name: 'Unnamed input' },
    ]);
    // Each input has a running status of its own.
    all[0].onmidimessage?.({ data: Uint8Array.of(0x90, 60, 100) });
    all[1].onmidimessage?.({ data: Uint8Array.of(61, 100) });
    all[0].onmidimessage?.({ data: Uint8Array.of(60, 0) });
    all[0].onmidimessage?.({ data: null });
    expect(told.splice(0)).toEqual([
      ['a', { kind: 'on', channel: 0, note: 60, velocity: 100 }],
      ['a', { kind: 'off', channel: 0, note: 60 }],
    ]);

    all[0].state = 'disconnected';
    all[3].state = 'connected';
    access.onstatechange?.();
    expect(told.splice(0)).toEqual([
      ['a', 'gone'],
      [{ id: 'b', name: 'Maker' }, { id: 'c', name: 'Unnamed input' }, { id: 'd', name: 'Away' }],
    ]); // prettier-ignore

    midi.close();
    expect(access.onstatechange).toBeNull();
    expect(all.every(({ onmidimessage }) => onmidimessage === null)).toBe(true);
    expect(all[1].close).toHaveBeenCalledOnce();
  });
});
