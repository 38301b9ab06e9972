import './bits.css';
import { useEffect, useMemo, useState } from 'react';
import {
  levelsOfTable,
  levelsOfVolts,
  lowestBits,
  soundWithBitsOff,
  type BitMask,
} from '../../../../../shared/listening/index.ts';
import { boardVolts } from '../../../../../shared/output-stage/index.ts';
import { Button, ChoiceField, Explain } from '../../../../components/index.ts';
import type { TableAnswer } from '../../../../workers/engine-messages.ts';
import { useListening, type Given } from '../listening.tsx';
import { BitRow } from './bit-row.tsx';
import { BitsTable, type FigureShown } from './bits-table.tsx';
import { BottomField } from './bottom-field.tsx';
import { LeftFigures } from './left-figures.tsx';
import { useBitsFigures } from './use-bits-figures.ts';
import { sayBitsOff } from './words.ts';

const owner = 'bits';
/** SINAD so far below SNR is the wave’s own partials, in dB. */
const partialsDb = 6;

/** Switches bits of the table off while it plays, and tells what each of them is worth. */
export function BitsPanel() {
  const listening = useListening();
  const { table, take, status } = listening;
  const { bits } = table.definition.table;
  const [kept, setKept] = useState<{ bits: number; off: BitMask }>({ bits, off: 0 });
  // A table of another depth has other bits.
  const off = kept.bits === bits ? kept.off : 0;
  const given = useGiven(off);
  const isHeard = listening.owner === owner;

  useEffect(() => {
    if (isHeard) take(owner, off === 0 ? null : given);
  }, [isHeard, off, given, take]);
  useEffect(() => () => take(owner, null), [take]);

  const hear = (next: BitMask) => {
    setKept({ bits, off: next });
    // The effect above puts the bits of the next rendering in the place of what plays now.
    if (next !== 0) take(owner, listening.sounding);
  };

  return (
    <>
      <p className="field-description">
        A bit that is off reads 0 in every code, as if its pin rested low. The mean that this shifts is not
        heard.
      </p>
      <BitRow bits={bits} off={off} onChange={hear} />
      <BottomField bits={bits} off={off} onChange={(count) => hear(lowestBits(count))} />
      <div className="bits-actions">
        <Button
          size="small"
          onPress={() => hear(0)}
          isDisabled={off === 0}
          disabledReason="All bits are on already"
        >
          All bits on
        </Button>
        {off !== 0 && !isHeard && (
          <Button size="small" variant="primary" onPress={() => hear(off)}>
            Hear it with {sayBitsOff(off, bits)}
          </Button>
        )}
      </div>
      {off !== 0 && (
        <p className="field-description">
          {isHeard
            ? `${status === 'playing' ? 'Heard' : 'Heard with the next press of Play'}: ${sayVoice(given.hearing)} with ${sayBitsOff(off, bits)}.`
            : 'Another part decides what is heard now, with all its bits.'}
        </p>
      )}
      <Left table={table} off={off} />
    </>
  );
}

function sayVoice(hearing: string): string {
  if (hearing === 'ladder') return 'the table through the ladder';
  if (hearing === 'output') return 'the table at the output';
  return 'the quantised table';
}

/** The panel's sound with bits off. Of the ideal curve nothing can be switched off, so the table is heard for it. */
function useGiven(off: BitMask): Given {
  const { table, board, sound, hearing } = useListening();
  const { codes, definition } = table;
  const levels = useMemo(() => {
    const onBoard = board === null ? null : levelsOfVolts(boardVolts(board));
    return {
      table: levelsOfTable(definition.table),
      ...(onBoard !== null && { ladder: onBoard, output: onBoard }),
    };
  }, [definition.table, board]);
  return useMemo(
    () => ({
      sound: soundWithBitsOff(sound, codes, levels, off),
      hearing: hearing === 'ideal' ? 'table' : hearing,
    }),
    [sound, codes, levels, off, hearing],
  );
}

/** What the bits that are on are worth. */
function Left({ table, off }: { table: TableAnswer; off: BitMask }) {
  const { codes, cycle, definition, report } = table;
  const { bits } = definition.table;
  const coded = useMemo(() => ({ codes, cycle, table: definition.table }), [codes, cycle, definition.table]);
  const { figures, fault } = useBitsFigures(coded, off);
  const [chosen, setChosen] = useState<FigureShown | null>(null);
  const { snrDb, sinadDb } = report;
  const isOfPartials = snrDb !== null && (sinadDb === null || snrDb - sinadDb > partialsDb);
  const shown = chosen ?? (isOfPartials ? 'unwanted' : 'sinad');
  return (
    <>
      <LeftFigures figures={figures.get(off)} all={figures.get(0)} says={sayBitsOff(off, bits)} />
      {isOfPartials && (
        <p className="figure-note">
          The wave has partials of its own, which SINAD counts as distortion: go by the strongest line added.
        </p>
      )}
      {fault !== null && <p className="figure-note">The figures could not be computed: {fault}</p>}
      <ChoiceField
        label="Shown for each bit"
        value={shown}
        options={[
          { value: 'sinad', label: 'SINAD' },
          { value: 'unwanted', label: 'Strongest line added' },
        ]}
        onChange={setChosen}
        aside={
          <Explain title="What each bit is worth">
            <p>
              One column is of the bit off alone, the other of that bit and all below it off, which is the
              table cut down from the bottom.
            </p>
            <p>
              A full-scale sine that loses its k lowest bits keeps about <code>6.02·(b − k) + 1.76</code> dB
              (Bennett 1948). Figures are of the table’s own levels, without the board.
            </p>
          </Explain>
        }
      />
      <BitsTable bits={bits} off={off} figures={figures} shown={shown} />
    </>
  );
}
