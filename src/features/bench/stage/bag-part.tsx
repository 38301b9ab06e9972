import { useMemo, useState } from 'react';
import {
  parseResistorBag,
  Refusal,
  type Board,
  type LadderOutput,
  type ResistorBag,
} from '../../../../shared/contract/index.ts';
import { formatQuantity, quantityText } from '../../../../shared/quantities/index.ts';
import { readList } from '../../../boards/index.ts';
import { Button, TextField } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { Fault } from './fault.tsx';
import { fitWishes, wishFit } from './fit-wishes.ts';
import { useStage } from './use-stage.ts';

/** Measured resistors that are not soldered yet, and a place for each. */
export function BagPart({ output }: { board: Board; output: LadderOutput }) {
  const { singles, doubles } = useLive(fitWishes);
  const { bits, rHigh, rLow } = output;
  const read = { singles: readList(singles, 'Ω'), doubles: readList(doubles, 'Ω') };
  const bag = useMemo(
    () => bagOf(singles, doubles, bits, (rHigh + rLow) / 2),
    [singles, doubles, bits, rHigh, rLow],
  );
  const [asked, setAsked] = useState<(StageJob & { kind: 'places' }) | null>(null);
  const { answer, fault, isBusy } = useStage('places', asked);
  return (
    <details>
      <summary>A bag of measured resistors: which goes where</summary>
      <div className="space-y-2">
        <TextField
          label="Resistors for R, Ω"
          isCode
          autoComplete="off"
          value={singles}
          onChange={(next) => wishFit({ singles: next })}
          description={`At least ${bits - 1}, parted by blanks.`}
          problem={'fault' in read.singles ? read.singles.fault : undefined}
        />
        <TextField
          label="Resistors for 2R, Ω"
          isCode
          autoComplete="off"
          value={doubles}
          onChange={(next) => wishFit({ doubles: next })}
          description={`At least ${bits + 1}, parted by blanks.`}
          problem={'fault' in read.doubles ? read.doubles.fault : undefined}
        />
        {'why' in bag && bag.why !== '' && <p className="figure-note">{bag.why}</p>}
        {'bag' in bag && (
          <Button
            size="small"
            isDisabled={asked !== null && isBusy}
            onPress={() => setAsked({ kind: 'places', bag: bag.bag })}
          >
            Propose places
          </Button>
        )}
        <Fault of="places" fault={fault} />
        {answer !== null && (
          <div role="status" className="space-y-2">
            <p className="figure-note">
              Largest |DNL| {formatQuantity(answer.maxDnl, 'LSB', { significant: 3 })} over{' '}
              {answer.tried.toLocaleString('en')} arrangements,{' '}
              {answer.method === 'exhaustive'
                ? 'all there are: none is better.'
                : 'the best that a search found; there may be a better one.'}
            </p>
            <Button
              size="small"
              onPress={() =>
                wishFit({
                  rungs: listText(answer.rungs),
                  series: listText(answer.series),
                  terminator: listText([answer.terminator]),
                })
              }
            >
              Take these places up
            </Button>
          </div>
        )}
      </div>
    </details>
  );
}

const listText = (ohms: readonly number[]) => ohms.map((one) => quantityText(one, 'Ω')).join(' ');

function bagOf(
  singlesText: string,
  doublesText: string,
  bits: number,
  pinOhms: number,
): { bag: ResistorBag } | { why: string } {
  const singles = readList(singlesText, 'Ω');
  const doubles = readList(doublesText, 'Ω');
  if ('fault' in singles || 'fault' in doubles) return { why: '' };
  if (singles.numbers === undefined && doubles.numbers === undefined) return { why: '' };
  try {
    return {
      bag: parseResistorBag({
        bits,
        singles: singles.numbers ?? [],
        doubles: doubles.numbers ?? [],
        pinOhms,
      }),
    };
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const names: Record<string, string> = { singles: 'Resistors for R', doubles: 'Resistors for 2R' };
    const [{ path, value, allowed }] = error.problems;
    return { why: `${names[path] ?? path}: ${value} is not allowed. Allowed: ${allowed}.` };
  }
}
