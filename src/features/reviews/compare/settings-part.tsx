import { useMemo } from 'react';
import { Panel } from '../../../components/index.ts';
import { changedSettings } from '../../../settings/index.ts';
import { SettingRows } from './setting-rows.tsx';
import type { Pair } from './side.ts';

/** Which settings differ, in words. */
export function SettingsPart({ pair: { a, b }, names }: { pair: Pair; names: { a: string; b: string } }) {
  const changes = useMemo(
    () => changedSettings(a.revision.definition, b.revision.definition),
    [a.revision, b.revision],
  );
  const title =
    changes.length === 0
      ? 'No setting differs'
      : `${changes.length.toLocaleString('en')} ${changes.length === 1 ? 'setting differs' : 'settings differ'}`;
  return (
    <Panel title={title}>
      {changes.length === 0 ? (
        <p className="quiet">Both were made of the same definition, word by word.</p>
      ) : (
        <SettingRows
          caption={`Settings of ${names.a} and of ${names.b}`}
          heads={[names.a, names.b]}
          settings={changes.map(({ path, name, before, after }) => ({ path, name, values: [before, after] }))}
        />
      )}
    </Panel>
  );
}
