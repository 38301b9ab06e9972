import type { KeyboardEvent } from 'react';
import type { MixPart, Problem, Source } from '../../../../../shared/contract/index.ts';
import { Button, IconButton, NumberField, icons } from '../../../../components/index.ts';
import { CycleSketch } from '../cycle-sketch.tsx';
import { problemAt } from '../problems.ts';
import { sayInWords } from '../source-words.ts';
import { noDepthFor, noRoomFor, pathOf, type Place } from './mix-tree.ts';

export type PartAct = 'up' | 'down' | 'duplicate' | 'wrap' | 'remove';

export interface TreeHands {
  readonly whole: Source;
  readonly selected: Place;
  readonly problems: readonly Problem[];
  onSelect: (place: Place) => void;
  onGain: (place: Place, gain: number) => void;
  onAct: (place: Place, act: PartAct) => void;
  onAdd: (around: Place) => void;
}

/** The parts of one mix, each with those of its own below it. */
export function PartList({
  parts,
  around,
  hands,
}: {
  parts: readonly MixPart[];
  around: Place;
  hands: TreeHands;
}) {
  const full = noRoomFor(hands.whole, around);
  return (
    <div className="mix-parts">
      <ol>
        {parts.map((part, index) => {
          const place = [...around, index];
          return (
            <li key={index}>
              <PartRow part={part} place={place} beside={parts.length} hands={hands} />
              {part.source.kind === 'mix' && (
                <PartList parts={part.source.parts} around={place} hands={hands} />
              )}
            </li>
          );
        })}
      </ol>
      <Button
        size="small"
        icon={icons.add}
        isDisabled={full !== undefined}
        disabledReason={full}
        onPress={() => hands.onAdd(around)}
      >
        Add a part{around.length > 0 && ` to ${nameOf(around)}`}
      </Button>
    </div>
  );
}

interface PartRowProps {
  part: MixPart;
  place: Place;
  /** Parts of the same mix. */
  beside: number;
  hands: TreeHands;
}

function PartRow({ part, place, beside, hands }: PartRowProps) {
  const { whole, selected, problems, onSelect, onGain, onAct } = hands;
  const name = nameOf(place);
  const path = pathOf(place);
  const index = place[place.length - 1];
  const isAtFault = problems.some((problem) => problem.path.startsWith(`${path}.`) || problem.path === path);
  const only = beside === 1 ? 'A mix needs a part.' : undefined;
  const full = noRoomFor(whole, place.slice(0, -1), part.source);
  const deep = noDepthFor(whole, place);

  const onKeyDown = (event: KeyboardEvent) => {
    const act = event.altKey ? { ArrowUp: 'up', ArrowDown: 'down' }[event.key] : undefined;
    const isRemoval = !event.altKey && event.key === 'Delete';
    if (act === undefined && !isRemoval) return;
    event.preventDefault();
    if (act !== undefined) onAct(place, act as PartAct);
    else if (only === undefined) onAct(place, 'remove');
  };

  return (
    <div className="mix-row" data-selected={selected.join() === place.join() ? '' : undefined}>
      <button
        type="button"
        className="mix-choose"
        aria-pressed={selected.join() === place.join()}
        data-path={path}
        data-place={place.join()}
        onClick={() => onSelect(place)}
        onFocus={() => onSelect(place)}
        onKeyDown={onKeyDown}
      >
        <CycleSketch source={part.source} isSound={!isAtFault} />
        <span className="mix-words">
          <span className="mix-name">
            {name}
            {isAtFault && (
              <icons.fault width="14" height="14" role="img" aria-label="at fault" aria-hidden={false} />
            )}
          </span>
          <span>{saySource(part.source)}</span>
        </span>
      </button>
      <div className="mix-acts">
        <div data-path={`${path.replace(/\.source$/, '')}.gain`}>
          <NumberField
            hideLabel
            label={`Gain of ${lower(name)}`}
            step={0.05}
            allowed="a finite number, or dB as in −6 dB"
            value={part.gain}
            onChange={(gain) => onGain(place, gain)}
            problem={problemAt(problems, `${path.replace(/\.source$/, '')}.gain`)}
          />
        </div>
        <Act
          act="up"
          name={name}
          icon={icons.arrowUp}
          place={place}
          onAct={onAct}
          no={index === 0 ? 'It is the first.' : undefined}
        />
        <Act
          act="down"
          name={name}
          icon={icons.arrowDown}
          place={place}
          onAct={onAct}
          no={index === beside - 1 ? 'It is the last.' : undefined}
        />
        <Act act="duplicate" name={name} icon={icons.copy} place={place} onAct={onAct} no={full} />
        <Act act="wrap" name={name} icon={icons.steps} place={place} onAct={onAct} no={deep} />
        <Act act="remove" name={name} icon={icons.remove} place={place} onAct={onAct} no={only} />
      </div>
    </div>
  );
}

const says: Record<PartAct, (name: string) => string> = {
  up: (name) => `Move ${name} up`,
  down: (name) => `Move ${name} down`,
  duplicate: (name) => `Duplicate ${name}`,
  wrap: (name) => `Make ${name} a mix of its own`,
  remove: (name) => `Remove ${name}`,
};

interface ActProps {
  act: PartAct;
  name: string;
  icon: (typeof icons)['add'];
  place: Place;
  onAct: (place: Place, act: PartAct) => void;
  /** Why it cannot be done. */
  no: string | undefined;
}

function Act({ act, name, icon, place, onAct, no }: ActProps) {
  return (
    <IconButton
      size="small"
      label={says[act](lower(name))}
      icon={icon}
      isDisabled={no !== undefined}
      disabledReason={no}
      onPress={() => onAct(place, act)}
    />
  );
}

/** `Part 2`, and in a mix within it `Part 2.1`. */
export function nameOf(place: Place): string {
  return `Part ${place.map((index) => index + 1).join('.')}`;
}

const lower = (name: string) => name.replace('Part', 'part');

function saySource(source: Source): string {
  if (source.kind !== 'mix') return sayInWords(source);
  const count = source.parts.length;
  return `${source.operation === 'sum' ? 'Sum' : 'Product'} of ${count} ${count === 1 ? 'part' : 'parts'}`;
}
