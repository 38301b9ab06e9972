import { useCallback } from 'react';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Caution, Explain } from '../../../components/index.ts';
import { driveOf, ListenPanel, toneOfDrive, type Playback } from '../listen/index.ts';
import { RatesRecesses } from '../rates/index.ts';
import { StageRecesses } from '../stage/index.ts';
import { useCalmTable } from '../state/tables.ts';
import { theBench, useBench, useDefinition } from '../state/use-bench.ts';

/** How the wave sounds, and what will come out of the pin. */
export function OutputFlight({ isOpen }: { isOpen: boolean }) {
  const table = useCalmTable();
  const playback = useBench(({ history }) => history.present.playback);
  const change = useCallback(
    (next: Playback) =>
      theBench().change((work) => ({ ...work, playback: next }), { coalesce: changedPart(next) }),
    [],
  );
  return (
    <div className="space-y-5">
      {table !== null && (
        <ListenPanel
          table={table}
          playback={playback}
          onPlaybackChange={change}
          isOnBench
          isInSight={isOpen}
        />
      )}
      <RatesRecesses />
      <StageRecesses />
      <AtThePin />
    </div>
  );
}

/** Numbers that are typed or stepped join into one step; a choice is a step of its own. */
function changedPart(next: Playback): string | undefined {
  const { playback } = theBench().getState().history.present;
  return playback.mode === next.mode && playback.by === next.by ? 'playback' : undefined;
}

function AtThePin() {
  const table = useDefinition((definition) => definition.table);
  const playback = useBench(({ history }) => history.present.playback);
  const drive = driveOf(playback, table);
  const { sampleRateHz } = drive;
  const rate = hertz(sampleRateHz);
  return (
    <section className="space-y-2">
      <h3 className="flex items-center gap-2">
        At the pin
        <Explain title="At the pin">
          <p>
            The pin holds each entry until the next, so the wave comes out as a staircase. Beside the wave’s
            own lines it has their images round every multiple of the sample rate.
          </p>
          <p>
            <code>tone = K·fs/N</code> with fs the sample rate, N the table length and K the cycles in the
            table.
          </p>
        </Explain>
      </h3>
      <p>
        {drive.kind === 'loop' && (
          <>
            {table.length} entries written over and over at {rate} give {hertz(toneOfDrive(drive, table))}. A
            low-pass filter takes the images round {rate} away.
          </>
        )}
        {drive.kind === 'accumulator' && (
          <>
            An entry every {formatQuantity(1 / sampleRateHz, 's', { significant: 4 })}, picked by an
            accumulator of {drive.accumulatorBits} bits and the step word {drive.stepWord}, gives{' '}
            {hertz(toneOfDrive(drive, table))}. A low-pass filter takes the images round {rate} away.
          </>
        )}
        {drive.kind === 'once' && (
          <>
            {table.length} entries written once at {rate} last{' '}
            {formatQuantity(table.length / sampleRateHz, 's', { significant: 3 })}; the pin stays on the last
            entry.
          </>
        )}
      </p>
      <Caution title="Before you connect anything">
        A pin drives a few milliamperes at most, and all pins of a port together have a limit of their own:
        see the data sheet of the part. A table whose mean is not in the middle puts DC through a loudspeaker;
        couple it through a capacitor or an amplifier made for it. Warning and alarm tones can fall under a
        standard: leave those to it and to a qualified engineer.
      </Caution>
    </section>
  );
}

/** Playback in one line. */
export function OutputSummary() {
  const table = useDefinition((definition) => definition.table);
  const playback = useBench(({ history }) => history.present.playback);
  const drive = driveOf(playback, table);
  const rate = `${hertz(drive.sampleRateHz)} sample rate`;
  switch (drive.kind) {
    case 'loop':
      return `Loop at ${hertz(toneOfDrive(drive, table))} · ${rate}`;
    case 'accumulator':
      return `Accumulator at ${hertz(toneOfDrive(drive, table))} · ${rate}`;
    case 'once':
      return `Once through · ${rate}`;
  }
}

const hertz = (value: number) => formatQuantity(value, 'Hz', { significant: 5 });
