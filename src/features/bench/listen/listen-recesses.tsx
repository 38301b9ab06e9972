import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';
import { useListenControls, useListening } from './listening.tsx';
import type { Playback } from './playback.ts';

const DevicePanel = later(
  'the place where it is heard',
  async () => (await import('./device/device-panel.tsx')).DevicePanel,
);
const BitsPanel = later('the bits by ear', async () => (await import('./bits/bits-panel.tsx')).BitsPanel);
const BlindPanel = later('the blind test', async () => (await import('./blind/blind-panel.tsx')).BlindPanel);
const KeysPanel = later('the keys', async () => (await import('./keys/keys-panel.tsx')).KeysPanel);
const PatternPanel = later(
  'the pulses and pauses',
  async () => (await import('./pattern/pattern-panel.tsx')).PatternPanel,
);
const KeepPanel = later('the sound file', async () => (await import('./keep/keep-panel.tsx')).KeepPanel);

/** What else can be done with the sound: parts of the listen panel that open in place. */
export function ListenRecesses() {
  const { device, playback } = useListening();
  const { isOnBench } = useListenControls();
  return (
    <div className="recesses">
      <Recess
        id="device"
        title="Where it is heard"
        summary={device === null ? 'Straight, as the browser plays it' : device.name}
      >
        <DevicePanel />
      </Recess>
      <Recess id="bits" title="Bits by ear" summary="Switch bits off while it plays">
        <BitsPanel />
      </Recess>
      {isOnBench && (
        <Recess id="blind" title="Blind test" summary="Whether two of them can be told apart">
          <BlindPanel />
        </Recess>
      )}
      <Recess id="keys" title="Keys and notes" summary="Play it as notes, glides between step words">
        <KeysPanel />
      </Recess>
      {isOnBench && (
        <Recess id="pattern" title="Pulses and pauses" summary={patternSummary(playback)}>
          <PatternPanel />
        </Recess>
      )}
      <Recess id="keep-sound" title="Keep a sound" summary="What is heard as a WAV file">
        <KeepPanel />
      </Recess>
    </div>
  );
}

function patternSummary({ pattern }: Playback): string {
  if (pattern === undefined) return 'None: the tone goes on and on';
  const { length } = pattern.steps;
  return `${length} ${length === 1 ? 'step' : 'steps'}, kept with the table`;
}
