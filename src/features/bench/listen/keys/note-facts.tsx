import { Refusal } from '../../../../../shared/contract/index.ts';
import {
  bentHz,
  noteHz,
  noteName,
  planTone,
  type PlayedTone,
  type ToneDrive,
} from '../../../../../shared/listening/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { sayCents } from '../../rates/read-tone.ts';
import { Fact } from '../../stage/fact.tsx';
import { wordNames } from './tone-drives.ts';

interface Tuned {
  drive: ToneDrive;
  a4Hz: number;
}

const hertz = (hz: number) => formatQuantity(hz, 'Hz', { significant: 8 });

/** The tone that the part makes of a frequency; `null` where it is out of reach. */
function toneOf(drive: ToneDrive, hz: number): PlayedTone | null {
  try {
    return planTone(drive, hz);
  } catch (error) {
    if (error instanceof Refusal) return null;
    throw error;
  }
}

/** One note: what is wanted, and what the pin really plays. */
export function NoteFacts({ drive, a4Hz, note, bend }: Tuned & { note: number; bend: number }) {
  const tone = toneOf(drive, bentHz(noteHz(note, a4Hz), bend));
  return (
    <dl className="rate-figures" aria-label="The note at hand">
      <Fact name="Note" is={`${noteName(note)}, number ${note}${sayBend(bend)}`}>
        <p>
          Numbers are those of MIDI 1.0: 60 is middle C, 69 the A above it. Names with octaves from C4, middle
          C, are common practice, no source.
        </p>
      </Fact>
      <Fact name="Wanted" is={hertz(bentHz(noteHz(note, a4Hz), bend))}>
        <p>
          <code>A4·2^((number − 69)/12)</code>: equal temperament (common practice, no source), with A4 at 440
          Hz (ISO 16) or as it is set here.
        </p>
      </Fact>
      <Fact name="Played" is={tone === null ? 'out of reach' : hertz(tone.playedHz)}>
        <p>{howPlayed[drive.kind]}</p>
      </Fact>
      <Fact name="Error" is={tone === null ? '–' : sayCents(tone.errorCents)}>
        <p>
          <code>1200·log2(played/wanted)</code>; a hundred cents are a semitone. Below some 5 cents few people
          hear it in a single tone (common practice, no source).
        </p>
      </Fact>
      <Fact
        name={wordNames[drive.kind]}
        is={tone === null ? '–' : tone.word === null ? hertz(tone.sampleRateHz) : String(tone.word)}
      >
        <p>{whatWord[drive.kind]}</p>
      </Fact>
    </dl>
  );
}

const howPlayed: Readonly<Record<ToneDrive['kind'], string>> = {
  rate: 'As wanted: with a loop and a free sample rate, fs = tone·N/K is taken exactly.',
  timer:
    'K·fclk/(prescaler·(compare + 1)·N) with the compare value nearest to the wanted tone; the prescaler stays as it is chosen.',
  accumulator: 'K·W·fs/2^M with the step word nearest to the wanted tone; the sample rate stays.',
};

const whatWord: Readonly<Record<ToneDrive['kind'], string>> = {
  rate: 'Entries a second that give the tone: fs = tone·N/K.',
  timer: 'What firmware writes to the timer for this note.',
  accumulator: 'What firmware adds to the accumulator at each sample for this note.',
};

function sayBend(bend: number): string {
  if (bend === 0) return '';
  return `, bent by ${sayCents(100 * bend)}`;
}

/** All notes in sight, each as the part makes it. */
export function NoteTable({ drive, a4Hz, notes }: Tuned & { notes: readonly number[] }) {
  return (
    <details className="key-table">
      <summary>
        {noteName(notes[0])} to {noteName(notes[notes.length - 1])} in figures
      </summary>
      <table className="plan-table">
        <thead>
          <tr>
            <th scope="col">Note</th>
            <th scope="col">Wanted</th>
            <th scope="col">Played</th>
            <th scope="col">{wordNames[drive.kind]}</th>
          </tr>
        </thead>
        <tbody>
          {notes.map((note) => {
            const wantedHz = noteHz(note, a4Hz);
            const tone = toneOf(drive, wantedHz);
            return (
              <tr key={note}>
                <th scope="row">
                  <span>{noteName(note)}</span>
                  <small>{note}</small>
                </th>
                <td>
                  <span>{formatQuantity(wantedHz, 'Hz', { significant: 7 })}</span>
                </td>
                <td>
                  <span>
                    {tone === null ? 'out of reach' : formatQuantity(tone.playedHz, 'Hz', { significant: 7 })}
                  </span>
                  {tone !== null && <small>{sayCents(tone.errorCents)}</small>}
                </td>
                <td>
                  <span>
                    {tone === null
                      ? '–'
                      : tone.word === null
                        ? formatQuantity(tone.sampleRateHz, 'Hz', { significant: 6 })
                        : tone.word}
                  </span>
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </details>
  );
}
