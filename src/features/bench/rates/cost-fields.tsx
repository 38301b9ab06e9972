import { NumberField, SelectField } from '../../../components/index.ts';
import { chosenCost, costChoices, costCyclesOf } from './sample-cost.ts';
import { ownCost, wish, type RateWishes } from './wishes.ts';

/** What one sample costs: a proven playback code's cycles, or a number of one's own, which typing makes of any. */
export function CostFields({ wishes }: { wishes: RateWishes }) {
  return (
    <>
      <div className="col-span-full">
        <SelectField
          label="Cost of one sample"
          options={costChoices(wishes.costCycles)}
          value={chosenCost(wishes)}
          onChange={(costOf) => wish({ costOf })}
        />
      </div>
      <NumberField
        label="Cycles of a sample"
        unit="cycles"
        min={0}
        max={1e6}
        isInteger
        allowed="a whole number of clock cycles from 0"
        description="Counted against the cycles between two samples."
        value={costCyclesOf(wishes)}
        onChange={(costCycles) => wish({ costOf: ownCost, costCycles })}
      />
    </>
  );
}
