import { useKeyGroup, useSingleKeys, type KeyGroup } from '../../../components/index.ts';

const listenKeys: KeyGroup = {
  title: 'Listening',
  keys: [{ caps: ['P'], does: 'Play or stop', isSingle: true }],
};

/** P plays and stops wherever nothing takes it as text. */
export function usePlayKey(toggle: () => void): void {
  useKeyGroup(listenKeys);
  useSingleKeys((key) => {
    if (key === 'p') toggle();
    return key === 'p';
  });
}
