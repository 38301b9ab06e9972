import { useEffect, useState, type ComponentType } from 'react';
import { Button } from '../../../components/index.ts';

/**
 * A part of the page whose program is loaded when it is first shown, and again on a press where that failed. What is
 * on the bench is not touched by either.
 *
 * @param what what is opened, for the words meanwhile: `the noise settings`
 */
export function later<Props extends object>(
  what: string,
  load: () => Promise<ComponentType<Props>>,
): ComponentType<Props> {
  let loaded: ComponentType<Props> | null = null;
  return function Later(props: Props) {
    const [Part, setPart] = useState<ComponentType<Props> | null>(() => loaded);
    const [attempt, setAttempt] = useState(1);
    const [failed, setFailed] = useState(0);
    useEffect(() => {
      if (loaded !== null) return;
      let isOver = false;
      load().then(
        (part) => {
          loaded = part;
          if (!isOver) setPart(() => part);
        },
        () => {
          if (!isOver) setFailed(attempt);
        },
      );
      return () => {
        isOver = true;
      };
    }, [attempt]);
    if (Part !== null) return <Part {...props} />;
    if (failed !== attempt) return <p role="status">Opening {what}…</p>;
    return (
      <div role="alert" className="space-y-2">
        <p>The program for {what} could not be loaded. The wave on the bench is not touched by that.</p>
        <Button size="small" onPress={() => setAttempt(attempt + 1)}>
          Try again
        </Button>
      </div>
    );
  };
}
