import { useEffect, useState } from 'react';
import {
  Dialog,
  IconButton,
  Kbd,
  icons,
  useKeyGroup,
  useKeyGroups,
  type KeyGroup,
} from '../components/index.ts';

const everywhere: KeyGroup = {
  title: 'Everywhere',
  keys: [
    { caps: ['?'], does: 'Show these keys' },
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

/** Whether a press of a letter belongs to what has the focus. */
function takesLetters(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable || target.matches('input:not([type=radio], [type=checkbox]), textarea, select'))
  );
}

/** The `?` button and the sheet that lists the keys of all that is on screen. */
export function KeySheet() {
  const [isOpen, setIsOpen] = useState(false);
  const groups = useKeyGroups();
  useKeyGroup(everywhere);
  useKeyGroup(numberFields);

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.key !== '?' || event.ctrlKey || event.metaKey || event.altKey || takesLetters(event.target))
        return;
      event.preventDefault();
      setIsOpen(true);
    };
    addEventListener('keydown', onKeyDown);
    return () => {
      removeEventListener('keydown', onKeyDown);
    };
  }, []);

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
        <div className="key-groups">
          {groups.map((group) => (
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
