import './pattern.css';
import { patternMs, type PulsePattern } from '../../../../../shared/contract/index.ts';
import {
  Button,
  Caution,
  Explain,
  Figure,
  FigureStrip,
  SwitchField,
  icons,
} from '../../../../components/index.ts';
import { theBench, useBench } from '../../state/use-bench.ts';
import { PatternDrawing } from './pattern-drawing.tsx';
import { presets } from './presets.ts';
import { StepsTable } from './steps-table.tsx';
import { isFull, repeatStep } from './steps.ts';
import { useHeardPattern } from './use-heard-pattern.ts';
import { sayTime, soundingMs } from './words.ts';

/** Pulses and pauses that the tone sounds in: kept with the table, heard, and exported beside it. */
export function PatternPanel() {
  const pattern = useBench(({ history }) => history.present.playback.pattern);
  return (
    <div className="space-y-4">
      <p className="field-description">
        When the tone sounds and when it pauses. The pattern is kept with the table, saved and shared with it,
        and the export writes it beside the words, with the code that plays it.
      </p>
      <div className="pulse-presets" role="group" aria-labelledby="pulse-presets">
        <p>
          <span id="pulse-presets">{pattern === undefined ? 'Begin with' : 'Put in its place'}</span>
          <PatternExplain />
        </p>
        {presets.map((preset) => (
          <Button key={preset.name} size="small" onPress={() => setPattern(preset.pattern)}>
            {preset.name}
          </Button>
        ))}
      </div>
      {pattern === undefined ? (
        <p className="field-description">No pattern is kept with this table: the tone goes on and on.</p>
      ) : (
        <Pattern pattern={pattern} />
      )}
      <Caution title="Signals that warn">
        A tone that warns people can fall under a standard that lays down its pattern, pitch and level. These
        patterns follow none: the standard that applies and a qualified engineer decide.
      </Caution>
    </div>
  );
}

function Pattern({ pattern }: { pattern: PulsePattern }) {
  const { steps, endless } = pattern;
  const { isOwner, isPlaying, play, stop, giveBack } = useHeardPattern(pattern);
  const whole = patternMs(pattern);
  return (
    <>
      <StepsTable
        steps={steps}
        onChange={(next, coalesce) => setPattern({ steps: next, endless }, coalesce)}
      />
      <div className="pulse-buttons">
        <Button
          size="small"
          icon={icons.add}
          isDisabled={isFull(steps)}
          disabledReason="A pattern holds at most 64 steps."
          onPress={() => setPattern({ steps: repeatStep(steps, steps.length - 1), endless })}
        >
          Add a step
        </Button>
        <Button size="small" variant="quiet" onPress={() => setPattern(undefined)}>
          Take the pattern away
        </Button>
      </div>
      <SwitchField
        label="Endless"
        description={endless ? 'The first step follows the last.' : 'Behind the last step it stays silent.'}
        isOn={endless}
        onChange={(next) => setPattern({ steps, endless: next })}
      />
      <PatternDrawing pattern={pattern} />
      <FigureStrip label="Figures of the pattern">
        <Figure
          label={endless ? 'One pass' : 'Whole duration'}
          value={sayTime(whole)}
          explain={
            <>
              <p>
                From the first pulse to the end of the last pause: <code>Σ (on + off) · repeats</code> over
                the steps.
              </p>
              <p>The firmware counts it in whole milliseconds; how true these are is its timer’s affair.</p>
            </>
          }
        />
        <Figure
          label="Sounding"
          value={String(Math.round((100 * soundingMs(pattern)) / whole))}
          unit="%"
          explain={
            <>
              <p>
                The share of a pass that it sounds: <code>Σ on · repeats</code> over the whole. A driver’s
                mean power and a battery’s drain go with it.
              </p>
              <p>What is right depends on what the signal is for; a standard may say.</p>
            </>
          }
        />
      </FigureStrip>
      <div className="pulse-buttons">
        <Button size="small" variant="primary" icon={icons.play} onPress={play}>
          {isPlaying ? 'From the beginning' : 'Play the pattern'}
        </Button>
        {isPlaying && (
          <Button size="small" icon={icons.stop} onPress={stop}>
            Stop the pattern
          </Button>
        )}
        {isOwner && (
          <Button size="small" variant="quiet" onPress={giveBack}>
            Back to the plain tone
          </Button>
        )}
      </div>
    </>
  );
}

function PatternExplain() {
  return (
    <Explain title="Pattern">
      <p>
        A step sounds for its on time, pauses for its off time, and does so as often as its repeats say; then
        comes the next step. Without an off time a pulse runs into the next.
      </p>
      <p>
        1 to 64 steps, 1 to 60,000 ms on, 0 to 60,000 ms off, 1 to 255 repeats: what 16 and 8 bits of firmware
        hold. Each edge is played with a short ramp, so that it does not click.
      </p>
      <p>Alt with the arrow keys moves the step that you are in.</p>
    </Explain>
  );
}

function setPattern(pattern: PulsePattern | undefined, coalesce?: string): void {
  theBench().change(
    ({ playback: { pattern: _before, ...playback }, ...work }) => ({
      ...work,
      playback: pattern === undefined ? playback : { ...playback, pattern },
    }),
    { coalesce },
  );
}
