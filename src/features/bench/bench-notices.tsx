import { useState } from 'react';
import { Button, Caution, IconButton, icons } from '../../components/index.ts';
import { saveText } from '../../components/save-text.ts';
import { examples } from './state/examples.ts';
import { theBench, useBench, useDefinition } from './state/use-bench.ts';

/** What there is to know about where the work is kept, and how to begin. */
export function BenchNotices() {
  const isKept = useBench((state) => state.isKept);
  const isFromOtherTab = useBench((state) => state.isFromOtherTab);
  return (
    <>
      <SetAside />
      <Welcome />
      <div role="status">
        {!isKept && (
          <Caution title="Not kept">
            This browser’s storage is full or closed to the page: what is on the bench will not survive a
            reload. Copy its link to keep it.
          </Caution>
        )}
        {isFromOtherTab && (
          <p className="bench-welcome">
            Another tab of this browser changed the bench. Undo brings back what was here.
          </p>
        )}
      </div>
    </>
  );
}

/**
 * Tells how to begin. It stays until it is put away, the wave goes by another name or the page is opened again: going
 * with the first change it would move what is dragged.
 */
function Welcome() {
  const [isShown, setIsShown] = useState(() => theBench().getState().isUntouched);
  const isItsWave = useDefinition(({ name }) => name === examples[0].work.definition.name);
  if (!isShown || !isItsWave) return null;
  return (
    <div className="bench-welcome">
      <p>
        A fog-signal tone of five partials is on the bench to begin with. Drag its bars, choose depth and
        length, listen, and take the C files with you: down the four flights, no account needed. What you make
        stays in this browser.
      </p>
      <IconButton size="small" label="Put this away" icon={icons.close} onPress={() => setIsShown(false)} />
    </div>
  );
}

function SetAside() {
  const text = useBench((state) => state.setAside);
  if (text === null) return null;
  return (
    <Caution title="Kept work could not be read">
      What this browser had kept for the bench is damaged or from a later version. It has been set aside
      unchanged.
      <span className="caution-actions">
        <Button
          size="small"
          icon={icons.download}
          onPress={() => saveText('bench-set-aside.json', text, 'application/json')}
        >
          Download it
        </Button>
        <Button size="small" variant="quiet" onPress={() => theBench().letSetAsideGo()}>
          Let it go
        </Button>
      </span>
    </Caution>
  );
}
