import { useState, type KeyboardEvent } from 'react';
import { pulseLimits, type PulseStep } from '../../../../../shared/contract/index.ts';
import { IconButton, NumberField, icons, type Icon } from '../../../../components/index.ts';
import { isFull, moved, removeStep, repeatStep, setStep, type Steps } from './steps.ts';
import { useRowKeys } from './use-row-keys.ts';

interface StepsTableProps {
  steps: Steps;
  /** @param coalesce changes of the same name that follow each other are one step of undo */
  onChange: (steps: PulseStep[], coalesce?: string) => void;
}

const columns = [
  { name: 'onMs', head: 'On, ms', label: 'On', unit: ', in milliseconds', step: 10 },
  { name: 'offMs', head: 'Off, ms', label: 'Off', unit: ', in milliseconds', step: 10 },
  { name: 'repeats', head: 'Repeats', label: 'Repeats', unit: '', step: 1 },
] as const;

const up: Icon = (props) => <icons.chevron {...props} style={{ rotate: '180deg' }} />;
const full = `A pattern holds at most ${pulseLimits.steps.max} steps.`;

/** The steps in exact numbers. Alt with the arrow keys moves the step that the focus is in. */
export function StepsTable({ steps, onChange }: StepsTableProps) {
  const { keys, setKeys } = useRowKeys(steps.length);
  const [told, setTold] = useState('');
  const last = steps.length - 1;

  const move = (from: number, to: number) => {
    if (to < 0 || to > last) return;
    setKeys((before) => moved(before, from, to));
    setTold(`Step ${from + 1} is step ${to + 1} now.`);
    onChange(moved(steps, from, to));
  };
  const repeat = (index: number) => {
    setKeys((before, fresh) => [...before.slice(0, index + 1), fresh, ...before.slice(index + 1)]);
    setTold(`Step ${index + 2} is there.`);
    onChange(repeatStep(steps, index));
  };
  const remove = (index: number) => {
    setKeys((before) => before.filter((_, k) => k !== index));
    setTold(`Step ${index + 1} is gone; ${last} left.`);
    onChange(removeStep(steps, index));
  };
  const onKeyDown = (event: KeyboardEvent, index: number) => {
    const by = { ArrowUp: -1, ArrowDown: 1 }[event.key];
    if (by === undefined || !event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    move(index, index + by);
  };

  return (
    <div className="pulse-steps">
      <table className="pulse-table">
        <caption className="sr-only">Steps of the pattern. Alt and an arrow key move a step.</caption>
        <thead>
          <tr>
            <th scope="col">
              <span className="sr-only">Step</span>
            </th>
            {columns.map(({ name, head }) => (
              <th key={name} scope="col">
                {head}
              </th>
            ))}
            <td />
          </tr>
        </thead>
        <tbody>
          {steps.map((step, index) => (
            <tr key={keys[index]} onKeyDown={(event) => onKeyDown(event, index)}>
              <th scope="row">{index + 1}</th>
              {columns.map(({ name, label, unit, step: by }) => (
                <td key={name}>
                  <NumberField
                    hideLabel
                    label={`${label} of step ${index + 1}${unit}`}
                    isInteger
                    {...pulseLimits[name]}
                    step={by}
                    allowed={`a whole number from ${pulseLimits[name].min} to ${pulseLimits[name].max}`}
                    value={step[name]}
                    onChange={(value) =>
                      onChange(setStep(steps, index, { [name]: value }), `pattern ${keys[index]} ${name}`)
                    }
                  />
                </td>
              ))}
              <td>
                <div className="pulse-acts">
                  <IconButton
                    size="small"
                    label={`Move step ${index + 1} up`}
                    icon={up}
                    isDisabled={index === 0}
                    disabledReason="It is the first."
                    onPress={() => move(index, index - 1)}
                  />
                  <IconButton
                    size="small"
                    label={`Move step ${index + 1} down`}
                    icon={icons.chevron}
                    isDisabled={index === last}
                    disabledReason="It is the last."
                    onPress={() => move(index, index + 1)}
                  />
                  <IconButton
                    size="small"
                    label={`Add a step after step ${index + 1}`}
                    icon={icons.add}
                    isDisabled={isFull(steps)}
                    disabledReason={full}
                    onPress={() => repeat(index)}
                  />
                  <IconButton
                    size="small"
                    label={`Remove step ${index + 1}`}
                    icon={icons.remove}
                    isDisabled={last === 0}
                    disabledReason="A pattern has at least one step."
                    onPress={() => remove(index)}
                  />
                </div>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="sr-only" role="status">
        {told}
      </p>
    </div>
  );
}
