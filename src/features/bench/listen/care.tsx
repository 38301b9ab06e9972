import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Caution } from '../../../components/index.ts';
import { useListening } from './listening.tsx';
import { useBeyond } from './use-beyond.ts';

export function HearingCaution() {
  return (
    <Caution title="Mind your hearing">
      Take headphones off, or turn the device down, before you press play; then raise the volume slowly.
      Whether a warning or alarm tone is fit for its use is for the standard that applies and a qualified
      engineer to say, not for this preview.
    </Caution>
  );
}

/** Says how much of the wave this browser cannot play. */
export function BeyondNote() {
  const { sounding, preview } = useListening();
  const beyond = useBeyond(sounding, preview?.contextRateHz);
  if (beyond === null) return null;
  const { count, limitHz, form } = beyond;
  const isOne = count === 1;
  const limit = formatQuantity(limitHz, 'Hz', { significant: 4 });
  return (
    <p className="field-description">
      {isOne ? 'One line lies' : `${count} lines lie`} above {limit}, half of the rate at which this browser
      plays, and {isOne ? 'is' : 'are'} not played{form === 'staircase' && '; nor are images up there'}.
    </p>
  );
}

/** Says what is heard of a table that has no two sides. */
export function UnipolarNote() {
  const { table } = useListening();
  if (table.definition.table.range !== 'unipolar') return null;
  return (
    <p className="field-description">
      This table is unipolar, as for a lamp’s duty. What is played is its swing about its mean, scaled so that
      the whole of 0…1 is as loud as −1…1 of a bipolar table; a slow fade makes no sound of its own.
    </p>
  );
}
