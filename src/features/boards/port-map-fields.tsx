import { useId, useState } from 'react';
import { outputLimits, type LadderOutput, type Port, type PortMap } from '../../../shared/contract/index.ts';
import { Button, NumberField, Panel, SelectField, TextField, icons } from '../../components/index.ts';
import { useUnread } from '../../components/unread-fields.ts';
import { freeName } from './draft.ts';
import { BoundedField } from './fields.tsx';
import { readReserved } from './read-reserved.ts';
import type { ProblemAt } from './use-board-form.ts';

interface PortMapFieldsProps {
  output: LadderOutput;
  onChange: (portMap: PortMap) => void;
  at: ProblemAt;
}

const path = 'output.portMap';

/** Which pin carries which bit, and which pins belong to something else. */
export function PortMapFields({ output: { portMap }, onChange, at }: PortMapFieldsProps) {
  const { bits, ports } = portMap;
  const setPort = (index: number, port: Port) => {
    const before = ports[index].name;
    onChange({
      ports: ports.map((one, i) => (i === index ? port : one)),
      bits: bits.map((bit) => (bit.port === before ? { ...bit, port: port.name } : bit)),
    });
  };
  return (
    <Panel title="Port map">
      <p className="quiet">
        Words are permuted as they are exported, so that one write a port is enough. Bits on two ports change
        at different moments. Reserved pins are never driven by a table.
      </p>
      {ports.map((port, index) => (
        <div key={index} className="port-row" role="group" aria-label={`Port ${port.name}`}>
          <div className="field-pair">
            <TextField
              label="Port"
              isCode
              autoComplete="off"
              value={port.name}
              onChange={(name) => setPort(index, { ...port, name })}
              problem={at(`${path}.ports[${index}].name`)}
            />
            <BoundedField
              label="Pins of the port"
              isInteger
              bounds={outputLimits.portWidth}
              value={port.width}
              onChange={(width) => setPort(index, { ...port, width })}
            />
            <ReservedField
              port={port}
              onChange={(reserved) => setPort(index, { ...port, reserved })}
              problem={port.reserved
                .map((_, place) => at(`${path}.ports[${index}].reserved[${place}].pin`))
                .find((one) => one !== undefined)}
            />
            <SelectField
              label="Reserved pins keep their level"
              value={port.reservedPins}
              options={[
                { value: 'baked', label: 'Written with each word' },
                { value: 'kept', label: 'Read and put back' },
              ]}
              onChange={(reservedPins) => setPort(index, { ...port, reservedPins })}
            />
          </div>
          {ports.length > 1 && (
            <Button
              size="small"
              aria-label={`Remove port ${port.name}`}
              onPress={() => onChange({ bits, ports: ports.filter((_, i) => i !== index) })}
            >
              Remove
            </Button>
          )}
        </div>
      ))}
      {ports.length < outputLimits.ports.max && (
        <div>
          <Button
            size="small"
            icon={icons.add}
            onPress={() =>
              onChange({
                bits,
                ports: [...ports, { name: freeName(ports), width: 8, reserved: [], reservedPins: 'baked' }],
              })
            }
          >
            Add a port
          </Button>
        </div>
      )}
      <BitPlaces portMap={portMap} onChange={onChange} at={at} />
    </Panel>
  );
}

function BitPlaces({
  portMap: { bits, ports },
  onChange,
  at,
}: {
  portMap: PortMap;
  onChange: (portMap: PortMap) => void;
  at: ProblemAt;
}) {
  const names = [...new Set(ports.map(({ name }) => name))];
  return (
    <table className="port-map">
      <caption className="sr-only">Pin of each bit, least significant first</caption>
      <thead>
        <tr>
          <th scope="col">Bit</th>
          <th scope="col">Port</th>
          <th scope="col">Pin</th>
        </tr>
      </thead>
      <tbody>
        {bits.map((place, bit) => {
          const set = (part: Partial<typeof place>) =>
            onChange({ ports, bits: bits.map((one, i) => (i === bit ? { ...one, ...part } : one)) });
          const options = (names.includes(place.port) ? names : [...names, place.port]).map((value) => ({
            value,
            label: value,
          }));
          return (
            <tr key={bit}>
              <th scope="row">{bit}</th>
              <td>
                <SelectField
                  label={`Port of bit ${bit}`}
                  hideLabel
                  value={place.port}
                  options={options}
                  onChange={(port) => set({ port })}
                  problem={at(`${path}.bits[${bit}].port`)}
                />
              </td>
              <td>
                <NumberField
                  label={`Pin of bit ${bit}`}
                  hideLabel
                  isInteger
                  min={0}
                  max={outputLimits.portWidth.max - 1}
                  allowed={`a whole number from 0 to ${outputLimits.portWidth.max - 1}`}
                  value={place.pin}
                  onChange={(pin) => set({ pin })}
                  problem={at(`${path}.bits[${bit}].pin`)}
                />
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

interface ReservedFieldProps {
  port: Port;
  onChange: (reserved: Port['reserved']) => void;
  problem?: string | undefined;
}

/** Reserved pins as they are written: `6 high, 7`. */
function ReservedField({ port, onChange, problem }: ReservedFieldProps) {
  const id = useId();
  const [text, setText] = useState(() =>
    port.reserved.map(({ pin, rest }) => `${pin}${rest === 'high' ? ' high' : ''}`).join(', '),
  );
  const read = readReserved(text);
  const fault = typeof read === 'string' ? read : undefined;
  useUnread(id, `Reserved pins of port ${port.name}`, fault);
  return (
    <TextField
      label="Reserved pins"
      isCode
      autoComplete="off"
      value={text}
      description="With their rest level, as in: 6 high, 7 low. Low where none is named."
      problem={fault ?? problem}
      onChange={(next) => {
        setText(next);
        const meant = readReserved(next);
        if (typeof meant !== 'string') onChange(meant);
      }}
    />
  );
}
