import './mix.css';
import { useEffect, useRef, useState, type KeyboardEvent } from 'react';
import type { MixSource, Problem, Source } from '../../../../../shared/contract/index.ts';
import { Button, ChoiceField, Explain, type SelectOption } from '../../../../components/index.ts';
import type { ChangeManner, OnChange } from '../change.ts';
import { problemsUnder } from '../source-path.ts';
import { LeafEditor } from './leaf-editor.tsx';
import {
  addPart,
  duplicatePart,
  movePart,
  nearestPlace,
  pathOf,
  placesIn,
  removePart,
  setGain,
  setOperation,
  setSource,
  sourceAt,
  wrap,
  type Place,
} from './mix-tree.ts';
import { PartList, nameOf, type PartAct } from './part-row.tsx';

export interface MixEditorProps {
  source: MixSource;
  onChange: OnChange;
  problems: readonly Problem[];
  tableLength: number;
  cycles: number;
  range: 'bipolar' | 'unipolar';
}

const operations: readonly SelectOption<MixSource['operation']>[] = [
  {
    value: 'sum',
    label: 'Sum',
    hint: 'Each part times its gain, added up: tones together, a tone on an offset.',
  },
  {
    value: 'product',
    label: 'Product',
    hint: 'Each part times its gain, multiplied: a tone under an envelope, ring modulation.',
  },
];

const acts: Record<PartAct, (source: Source, place: Place) => Source> = {
  up: (source, place) => movePart(source, place, -1),
  down: (source, place) => movePart(source, place, 1),
  duplicate: duplicatePart,
  wrap,
  remove: removePart,
};

/** A mix as a short tree of its parts, and below it the editor of the one that is chosen. */
export function MixEditor({ source, onChange, problems, ...frame }: MixEditorProps) {
  const [wanted, setWanted] = useState<Place>([0]);
  const selected = nearestPlace(source, wanted);
  const chosen = sourceAt(source, selected) ?? source;
  const tree = useRef<HTMLDivElement>(null);
  const focusNext = useRef<Place | null>(null);
  useEffect(() => {
    if (focusNext.current === null) return;
    tree.current?.querySelector<HTMLElement>(`[data-place="${focusNext.current.join()}"]`)?.focus();
    focusNext.current = null;
  });

  const choose = (place: Place, takesFocus = false) => {
    setWanted(place);
    if (takesFocus) focusNext.current = place;
  };
  const act = (place: Place, what: PartAct) => {
    const next = acts[what](source, place);
    const index = place[place.length - 1];
    const shift = { up: -1, down: 1, duplicate: 1, wrap: 0, remove: 0 }[what];
    const goal = nearestPlace(next, [...place.slice(0, -1), Math.max(0, index + shift)]);
    if (next !== source) onChange(next);
    choose(goal, true);
  };
  const walk = (event: KeyboardEvent) => {
    const here = (event.target as HTMLElement).dataset.place;
    if (here === undefined || event.altKey || event.ctrlKey || event.metaKey) return;
    const places = placesIn(source);
    const at = places.findIndex((place) => place.join() === here);
    const goal = { ArrowUp: at - 1, ArrowDown: at + 1, Home: 0, End: places.length - 1 }[event.key];
    if (goal === undefined || places[goal] === undefined) return;
    event.preventDefault();
    tree.current?.querySelector<HTMLElement>(`[data-place="${places[goal].join()}"]`)?.focus();
  };

  const path = pathOf(selected);
  const changeChosen = (next: Source, how?: ChangeManner) =>
    onChange(setSource(source, selected, next), {
      ...how,
      ...(how?.coalesce === undefined ? {} : { coalesce: `${path} ${how.coalesce}` }),
    });

  return (
    <div className="space-y-4">
      <Operation
        label="Parts are joined by their"
        value={source.operation}
        onChange={(operation) => onChange(setOperation(source, [], operation))}
      />
      <div ref={tree} role="group" aria-label="Parts of the mix" className="mix-tree" onKeyDown={walk}>
        <PartList
          parts={source.parts}
          around={[]}
          hands={{
            whole: source,
            selected,
            problems,
            onSelect: (place) => choose(place),
            onGain: (place, gain) =>
              onChange(setGain(source, place, gain), { coalesce: `${pathOf(place)} gain` }),
            onAct: act,
            onAdd: (around) => {
              const next = addPart(source, around);
              const mix = sourceAt(next, around);
              onChange(next);
              choose([...around, mix?.kind === 'mix' ? mix.parts.length - 1 : 0], true);
            },
          }}
        />
        <p className="field-description">
          Arrow keys walk the parts; with Alt they move one; Delete removes it. The number beside a part is
          its gain.
        </p>
      </div>
      {selected.length > 0 && (
        <section className="mix-chosen" aria-label={nameOf(selected)}>
          <div className="mix-chosen-head">
            <h3>{nameOf(selected)}</h3>
            <Button size="small" onPress={() => onChange(chosen)}>
              Use this part alone
            </Button>
          </div>
          {chosen.kind === 'mix' ? (
            <Operation
              label={`${nameOf(selected)} joins its parts by their`}
              value={chosen.operation}
              onChange={(operation) => onChange(setOperation(source, selected, operation))}
            />
          ) : (
            <LeafEditor
              key={path}
              path={path}
              source={chosen}
              onChange={changeChosen}
              problems={problemsUnder(problems, path)}
              {...frame}
            />
          )}
        </section>
      )}
    </div>
  );
}

function Operation({
  label,
  value,
  onChange,
}: {
  label: string;
  value: MixSource['operation'];
  onChange: (value: MixSource['operation']) => void;
}) {
  return (
    <ChoiceField
      label={label}
      options={operations}
      value={value}
      onChange={onChange}
      aside={
        <Explain title="Mix">
          <p>
            <code>f(t) = Σ gain · part(t)</code> for a sum, <code>Π gain · part(t)</code> for a product. Parts
            may be mixes themselves, up to 4 deep and 16 in each.
          </p>
          <p>
            A product has lines at the sums and differences of its parts’ frequencies; what of them lies above
            half the sample rate folds back.
          </p>
        </Explain>
      }
    />
  );
}
