import type { Board } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import type { PlayingAnswer } from '../../../workers/stage-messages.ts';
import { Fact, Facts } from './fact.tsx';

/** What the board makes of the table on the bench. */
export function PlayingFacts({ board, answer }: { board: Board; answer: PlayingAnswer }) {
  const { sinadDb, snrDb, codesSinadDb, codesSnrDb, meanSupplyAmps, image, glitch, pwm, waveform } = answer;
  return (
    <Facts label="The table through the board">
      <Fact name="SINAD through these levels" is={db(sinadDb)}>
        <p>
          Strongest line against all other lines but DC, of the table played through the board’s levels,
          mapped from lowest to highest. By even levels it is {db(codesSinadDb)}.
        </p>
        <p>Fit the table to measured levels to win back what the ladder costs.</p>
      </Fact>
      <Fact name="SNR through these levels" is={db(snrDb)}>
        <p>
          The wave against all that codes and levels add to it, 20·log10 of standard deviations. By even
          levels it is {db(codesSnrDb)}. For a wave of several partials it tells more than SINAD.
        </p>
      </Fact>
      {meanSupplyAmps !== null && (
        <Fact name="Mean supply current" is={q(meanSupplyAmps, 'A')}>
          <p>
            The sum over the high pins, averaged over the entries of the table. It is what the battery gives.
          </p>
        </Fact>
      )}
      {image !== null && (
        <Fact
          name="First image"
          is={`${formatQuantity(image.outputDb, 'dBc', { decimals: 1 })} at ${q(image.frequencyHz, 'Hz')}`}
        >
          <p>
            The tone’s image at <code>fs − f</code>, against the tone, behind hold and stage. Without a filter
            it is <code>20·log10(f/(fs − f))</code>.
          </p>
        </Fact>
      )}
      {glitch !== null && (
        <Fact
          name="Largest glitch"
          is={`${formatQuantity(glitch.areaVs * 1e9, '', { significant: 3 })} nV·s, ${glitch.from} → ${glitch.to}`}
        >
          <p>
            While edges are apart by {q(Math.abs(board.stage.edgeSkewS), 's')}, the step passes through code{' '}
            {glitch.through}. Area is the excursion beyond both levels times that time.
          </p>
        </Fact>
      )}
      {pwm !== null && (
        <Fact name="Carrier and its ripple" is={`${q(pwm.carrierHz, 'Hz')}, ${q(pwm.rippleVolts, 'V')}`}>
          <p>
            The first harmonic of the pulses at half duty, <code>2·span·|sin(πD)|/π</code>, behind the filter,
            as a peak.
          </p>
        </Fact>
      )}
      {!waveform.isSteady && (
        <Fact name="Op-amp" is="slews all the time">
          <p>
            It never catches up, so the wave has no one steady state; what is drawn is one period after many.
            A faster op-amp or a smaller wave is wanted.
          </p>
        </Fact>
      )}
      {waveform.isSteady && waveform.slewingShare > 0 && (
        <Fact name="Op-amp slews" is={formatQuantity(100 * waveform.slewingShare, '%', { significant: 3 })}>
          <p>
            Share of the time in which the output rises or falls at its slew rate and not as the wave does.
          </p>
        </Fact>
      )}
    </Facts>
  );
}

const q = (value: number, unit: string) => formatQuantity(value, unit, { significant: 4 });
const db = (value: number | null) => formatQuantity(value, 'dB', { decimals: 1 });
