import type { ReactNode } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import type { SmallestR } from '../../../../shared/output-stage/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import type { LevelsAnswer } from '../../../workers/stage-messages.ts';
import { Fact, Facts, Verdict } from './fact.tsx';

interface LevelFactsProps {
  board: Board;
  answer: LevelsAnswer;
}

/** What the board does by itself: step, span, resistance, linearity, currents. */
export function LevelFacts({ board, answer }: LevelFactsProps) {
  const { volts, linearity, mostOutputOhms, ladder, smallest } = answer;
  return (
    <>
      <Facts label="Figures of the board">
        <Fact name="LSB" is={q(linearity.lsbVolts, 'V')}>
          <p>
            The mean step between the end points, <code>(V(L−1) − V(0))/(L−1)</code> with L = 2^b codes (IEEE
            Std 1658-2011).
          </p>
        </Fact>
        <Fact name="Full scale" is={`${q(volts[0], 'V')} to ${q(volts[volts.length - 1], 'V')}`}>
          <p>
            Voltage of the first and of the last code at the converter, load included. An ideal ladder ends
            one LSB below its supply.
          </p>
        </Fact>
        <Fact name="Output resistance" is={q(mostOutputOhms, 'Ω')}>
          <p>
            The largest of all codes. An ideal ladder has R; with the capacitance behind it, it takes{' '}
            <code>Rout·C·ln(2^(b+1))</code> to settle within ½ LSB.
          </p>
        </Fact>
        <Fact name="Largest |INL|" is={lsb(linearity.maxInl)}>
          <p>
            <code>INL(c) = (V(c) − V(0))/LSB − c</code>: how far a level lies off the line through the end
            points. Below ½ LSB the table’s own rounding is as large.
          </p>
        </Fact>
        <Fact name="Largest |DNL|" is={lsb(linearity.maxDnl)}>
          <p>
            <code>DNL(c) = (V(c) − V(c−1))/LSB − 1</code>. At −1 a step is gone; below, a higher code gives a
            lower voltage.
          </p>
        </Fact>
        <Fact
          name="Monotonic"
          is={
            <Verdict isKept={linearity.monotonic}>
              {linearity.monotonic ? 'every step rises' : 'not every step rises'}
            </Verdict>
          }
        >
          <p>Whether each code gives a higher voltage than the one before it.</p>
        </Fact>
      </Facts>
      {ladder !== null && (
        <Facts label="Currents of the pins">
          <Current
            name="Worst pin"
            amps={ladder.worstPinAmps}
            limit={board.currents.pinAmps}
            where={`bit ${ladder.worstPin.bit}, code ${ladder.worstPin.code}`}
          >
            <p>The largest current of one pin over all codes, through its rung, with the output free.</p>
          </Current>
          <Current
            name="Worst pin, output shorted"
            amps={ladder.shorted.worstPinAmps}
            limit={board.currents.pinAmps}
            where={`bit ${ladder.shorted.worstPin.bit}, code ${ladder.shorted.worstPin.code}`}
          >
            <p>
              The same with the output shorted to the low rail: the top pin alone sees 2R. It asks for{' '}
              <code>R ≥ Vhigh/(2·Imax)</code>.
            </p>
          </Current>
          <Current
            name="All pins together"
            amps={Math.max(ladder.worstSupplyAmps, ladder.worstSinkAmps)}
            limit={board.currents.totalAmps}
            where={`gives ${q(ladder.worstSupplyAmps, 'A')}, takes ${q(ladder.worstSinkAmps, 'A')}`}
          >
            <p>The largest sum over the high pins of one code, or over the low ones, whichever is more.</p>
          </Current>
          <Current
            name="All pins, output shorted"
            amps={Math.max(ladder.shorted.worstSupplyAmps, ladder.shorted.worstSinkAmps)}
            limit={board.currents.totalAmps}
            where={`gives ${q(ladder.shorted.worstSupplyAmps, 'A')}`}
          >
            <p>The same sums with the output shorted to the low rail.</p>
          </Current>
          {smallest !== null && (
            <>
              <Fact name="Smallest R" is={<SmallestWords smallest={smallest.free} />}>
                <SmallestReasons smallest={smallest.free} />
              </Fact>
              <Fact name="Smallest R, shorted" is={<SmallestWords smallest={smallest.shorted} />}>
                <SmallestReasons smallest={smallest.shorted} />
              </Fact>
            </>
          )}
        </Facts>
      )}
    </>
  );
}

interface CurrentProps {
  name: string;
  amps: number;
  limit: number | undefined;
  where: string;
  children: ReactNode;
}

function Current({ name, amps, limit, where, children }: CurrentProps) {
  return (
    <Fact
      name={name}
      is={
        <>
          {q(amps, 'A')}
          {limit === undefined ? (
            <span className="quiet"> no limit given</span>
          ) : (
            <Verdict
              isKept={amps <= limit}
            >{`${amps <= limit ? 'within' : 'over'} ${q(limit, 'A')}`}</Verdict>
          )}
        </>
      }
    >
      {children}
      <p>Here: {where}. The limit is the board’s; the data sheet of the part decides.</p>
    </Fact>
  );
}

const reasons: Readonly<Record<SmallestR['decidedBy'], string>> = {
  'pin-current': 'the current of a pin decides',
  'total-current': 'the current of all pins decides',
  dnl: 'linearity decides',
  none: 'nothing asks for more',
};

function SmallestWords({ smallest }: { smallest: SmallestR }) {
  if (smallest.ohms === null) return <>none: {reasons.dnl}</>;
  return (
    <>
      {smallest.ohms === 0 ? 'any' : q(smallest.ohms, 'Ω')}
      <span className="quiet stage-reason">{reasons[smallest.decidedBy]}</span>
    </>
  );
}

function SmallestReasons({ smallest }: { smallest: SmallestR }) {
  const say = (ohms: number | null) => (ohms === null ? 'none does' : ohms === 0 ? 'any' : q(ohms, 'Ω'));
  return (
    <>
      <p>
        The smallest R that keeps all three: pin limit {say(smallest.pinOhms)}, limit of all pins{' '}
        {say(smallest.totalOhms)}, |DNL| at most ½ LSB with these pin resistances {say(smallest.dnlOhms)}.
      </p>
      <p>A limit that the board does not give asks for nothing.</p>
    </>
  );
}

const q = (value: number, unit: string) => formatQuantity(value, unit, { significant: 4 });
const lsb = (value: number) => formatQuantity(value, 'LSB', { significant: 3 });
