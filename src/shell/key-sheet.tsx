import { useState } from 'react';
import {
  Dialog,
  IconButton,
  Kbd,
  SwitchField,
  icons,
  useKeyGroup,
  useKeyGroups,
  useSingleKeySetting,
  useSingleKeys,
  type KeyGroup,
} from '../components/index.ts';

const everywhere: KeyGroup = {
  title: 'Everywhere',
  keys: [
    { caps: ['?'], does: 'Show these keys', isSingle: true },
    { caps: ['Esc'], does: 'Close what lies on top' },
    { caps: ['Tab'], does: 'Go to the next control' },
    { caps: ['Shift', 'Tab'], does: 'Go to the control before' },
  ],
};

const numberFields: KeyGroup = {
  title: 'Number fields',
  keys: [
    { caps: ['↑'], does: 'One step up' },
    { caps: ['↓'], does: 'One step down' },
    { caps: ['Shift', '↑'], does: 'Ten steps up; Page Up does the same' },
    { caps: ['Shift', '↓'], does: 'Ten steps down; Page Down does the same' },
  ],
};

/** The `?` button and the sheet that lists the keys of all that is on screen. */
export function KeySheet() {
  const [isOpen, setIsOpen] = useState(false);
  const groups = useKeyGroups();
  useKeyGroup(everywhere);
  useKeyGroup(numberFields);

  const [areSingleOn, setSingle] = useSingleKeySetting();
  useSingleKeys((key) => {
    if (key === '?') setIsOpen(true);
    return key === '?';
  });

  // What does not act is not listed.
  const shown = groups
    .map(({ title, keys }) => ({ title, keys: keys.filter(({ isSingle }) => areSingleOn || !isSingle) }))
    .filter(({ keys }) => keys.length > 0);

  return (
    <>
      <IconButton
        label="Keys"
        icon={icons.question}
        onPress={() => {
          setIsOpen(true);
        }}
      />
      <Dialog
        title="Keys"
        size="wide"
        isOpen={isOpen}
        onClose={() => {
          setIsOpen(false);
        }}
      >
        <SwitchField
          label="Single-key shortcuts"
          isOn={areSingleOn}
          onChange={setSingle}
          description="Letters, digits and signs that act without Ctrl, ⌘ or Alt wherever the focus is. Turn them off where speech input or a slip of the hand would set them off; this browser remembers it."
        />
        <div className="key-groups">
          {shown.map((group) => (
            <section key={group.title}>
              <h3>{group.title}</h3>
              <dl>
                {group.keys.map(({ caps, does }) => (
                  <div key={does}>
                    <dt>
                      {caps.map((cap) => (
                        <Kbd key={cap}>{cap}</Kbd>
                      ))}
                    </dt>
                    <dd>{does}</dd>
                  </div>
                ))}
              </dl>
            </section>
          ))}
        </div>
      </Dialog>
    </>
  );
}
