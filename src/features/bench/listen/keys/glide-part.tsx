import { useId, useMemo } from 'react';
import { Refusal } from '../../../../../shared/contract/index.ts';
import {
  glideEvents,
  planGlide,
  type Glide,
  type GlideSettings,
  type ToneDrive,
} from '../../../../../shared/listening/index.ts';
import { centsBetween } from '../../../../../shared/playback/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { Button, ChoiceField, Explain, NumberField, icons } from '../../../../components/index.ts';
import { useLive } from '../../../../live/index.ts';
import { sayHere } from '../../problems/field-problem.tsx';
import { readTone, sayCents } from '../../rates/read-tone.ts';
import { ToneField } from '../../rates/tone-field.tsx';
import { Fact } from '../../stage/fact.tsx';
import { TracesPlot } from '../../stage/traces-plot.tsx';
import { keyWishes, wish, type KeyWishes } from './key-wishes.ts';
import { wordNames } from './tone-drives.ts';
import type { NotePlayer } from './use-note-player.ts';

/** Both ends are held for a while, so that they can be heard. */
const holdSeconds = { before: 0.3, after: 0.5 } as const;

/** Steps in the list at most; the plot has all of them. */
const listedAtMost = 100;

/** A glide by the register's own steps: drawn, measured and played. */
export function GlidePart({ player, drive, a4Hz }: { player: NotePlayer; drive: ToneDrive; a4Hz: number }) {
  const titleId = useId();
  const { glideFrom, glideTo, glideMs, updateMs, path } = useLive(keyWishes);
  const made = useMemo(
    () => planned(drive, { glideFrom, glideTo, glideMs, updateMs, path, a4Hz }),
    [drive, glideFrom, glideTo, glideMs, updateMs, path, a4Hz],
  );
  return (
    <div className="key-part space-y-3" role="group" aria-labelledby={titleId}>
      <div className="key-part-title">
        <span id={titleId}>Glide</span>
        <Explain title="Glide">
          <p>
            At each update the register takes the whole number nearest to the path at that moment and holds it
            until the next, as firmware does on a tick. What is played are these steps, none smoother.
          </p>
          <p>
            Steps below some 5 cents are heard as a smooth glide (common practice, no source). A wider
            accumulator makes steps smaller; so does a shorter time between updates, until the register’s own
            step is reached.
          </p>
        </Explain>
      </div>
      <div className="field-pair">
        <ToneField label="From" text={glideFrom} a4Hz={a4Hz} onChange={(text) => wish({ glideFrom: text })} />
        <ToneField label="To" text={glideTo} a4Hz={a4Hz} onChange={(text) => wish({ glideTo: text })} />
        <NumberField
          label="Time"
          unit="ms"
          min={0}
          max={10_000}
          step={10}
          allowed="a number of milliseconds from 0 to 10000"
          value={glideMs}
          onChange={(ms) => wish({ glideMs: ms })}
        />
        <NumberField
          label="Update every"
          unit="ms"
          min={0.1}
          max={1_000}
          allowed="a number of milliseconds from 0.1 to 1000"
          value={updateMs}
          onChange={(ms) => wish({ updateMs: ms })}
        />
      </div>
      <ChoiceField
        label="Path"
        value={path}
        options={[
          {
            value: 'exponential',
            label: 'Equal cents',
            hint: 'As many cents every second: even to the ear.',
          },
          {
            value: 'linear',
            label: 'Equal hertz',
            hint: 'As many hertz every second: one addition an update.',
          },
        ]}
        onChange={(next) => wish({ path: next })}
      />
      {'fault' in made ? (
        <p className="figure-note" role="status">
          {made.fault}
        </p>
      ) : (
        <Planned {...{ player, drive, made }} />
      )}
    </div>
  );
}

interface PlannedGlide {
  readonly glide: Glide;
  readonly settings: GlideSettings;
}

function Planned({ player, drive, made }: { player: NotePlayer; drive: ToneDrive; made: PlannedGlide }) {
  const { glide, settings } = made;
  const { steps } = glide;
  const changes = steps.length - 1;
  const words = `${changes} ${changes === 1 ? 'step' : 'steps'}, the largest ${sayCents(glide.largestStepCents).replace('+', '')}.`;
  const play = () => {
    const lastSeconds = (glide.heldHz.length - 1) * settings.updateSeconds;
    player.perform({
      events: [
        ...glideEvents(steps, holdSeconds.before),
        { atSeconds: holdSeconds.before + lastSeconds + holdSeconds.after, gate: false },
      ],
    });
  };
  return (
    <>
      <div className="key-line">
        <Button size="small" icon={icons.play} onPress={play}>
          Play the glide
        </Button>
        <span className="field-description">
          Its first tone is held {holdSeconds.before} s before, its last {holdSeconds.after} s after.
        </span>
      </div>
      <dl className="rate-figures" aria-label="The glide">
        <Fact name="Steps" is={changes.toLocaleString('en')}>
          <p>Updates that change the register; the others find it right already.</p>
        </Fact>
        <Fact name="Largest step" is={sayCents(glide.largestStepCents).replace('+', '')}>
          <p>
            The largest <code>1200·log2</code> of one held tone over the one before. Below some 5 cents the
            steps are not heard as such (common practice, no source).
          </p>
        </Fact>
        <Fact name="Error at the end" is={sayCents(glide.endErrorCents)}>
          <p>How far the last tone lies above the one that was wanted: what the register cannot say.</p>
        </Fact>
        {drive.kind !== 'rate' && (
          <Fact name={wordNames[drive.kind]} is={`${steps[0].word} to ${steps[changes].word}`}>
            <p>What the register holds at the start and at the end.</p>
          </Fact>
        )}
      </dl>
      <TracesPlot
        title="Steps of the glide"
        kind="glide"
        data={{
          traces: [
            { name: 'path', values: glide.pathHz, color: 'water', width: 1.2, dash: [5, 3] },
            { name: 'held', values: glide.heldHz, color: 'brick', width: 1.6, isStairs: true },
          ],
          from: 0,
          step: settings.updateSeconds,
          x: { name: 'time', unit: 's' },
          y: { name: 'tone', unit: 'Hz' },
          reach: reachOf(glide),
          summary: `A glide from ${formatQuantity(glide.heldHz[0], 'Hz', { significant: 6 })} to ${formatQuantity(steps[changes].hz, 'Hz', { significant: 6 })}: ${words}`,
        }}
      />
      <StepList drive={drive} steps={steps} />
    </>
  );
}

/** Room for the traces' names above a glide that ends at the right, high up. */
function reachOf({ pathHz }: Glide): readonly [number, number] {
  const [first, last] = [pathHz[0], pathHz[pathHz.length - 1]];
  const low = Math.min(first, last);
  const high = Math.max(first, last);
  return [low, high + 0.15 * (high - low)];
}

function StepList({ drive, steps }: { drive: ToneDrive; steps: Glide['steps'] }) {
  const listed = steps.slice(0, listedAtMost);
  return (
    <details className="key-table">
      <summary>
        {steps.length > listedAtMost ? `The first ${listedAtMost} steps` : 'The steps'} in figures
      </summary>
      <table className="plan-table">
        <thead>
          <tr>
            <th scope="col">At</th>
            {drive.kind !== 'rate' && <th scope="col">{wordNames[drive.kind]}</th>}
            <th scope="col">Tone</th>
            <th scope="col">Step</th>
          </tr>
        </thead>
        <tbody>
          {listed.map((step, i) => (
            <tr key={step.atSeconds}>
              <th scope="row">
                <span>{formatQuantity(step.atSeconds, 's', { significant: 4 })}</span>
              </th>
              {drive.kind !== 'rate' && (
                <td>
                  <span>{step.word}</span>
                </td>
              )}
              <td>
                <span>{formatQuantity(step.hz, 'Hz', { significant: 7 })}</span>
              </td>
              <td>
                <span>{i === 0 ? '–' : sayCents(centsBetween(step.hz, steps[i - 1].hz))}</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}

function planned(
  drive: ToneDrive,
  {
    glideFrom,
    glideTo,
    glideMs,
    updateMs,
    path,
    a4Hz,
  }: Pick<KeyWishes, 'glideFrom' | 'glideTo' | 'glideMs' | 'updateMs' | 'path' | 'a4Hz'>,
): PlannedGlide | { readonly fault: string } {
  const [from, to] = [readTone(glideFrom, a4Hz), readTone(glideTo, a4Hz)];
  if ('fault' in from || 'fault' in to) return { fault: 'Put the marked field right, and the steps show.' };
  const settings: GlideSettings = {
    fromHz: from.hz,
    toHz: to.hz,
    seconds: glideMs / 1000,
    updateSeconds: updateMs / 1000,
    path,
  };
  try {
    return { glide: planGlide(drive, settings), settings };
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { fault: sayHere(error.problems[0]) };
  }
}
