import { useEffect, useState, type RefObject } from 'react';
import { createPortal } from 'react-dom';
import { Button, icons } from '../../../components/index.ts';

/** A stop that stays in sight while the panel with the other one is closed or scrolled away. */
export function PlayingFlag({ panel, onStop }: { panel: RefObject<HTMLElement | null>; onStop: () => void }) {
  const [isInSight, setIsInSight] = useState(true);
  useEffect(() => {
    if (panel.current === null) return;
    const observer = new IntersectionObserver(([entry]) => setIsInSight(entry.isIntersecting));
    observer.observe(panel.current);
    return () => observer.disconnect();
  }, [panel]);
  if (isInSight) return null;
  return createPortal(
    <div className="playing-flag" role="region" aria-label="Sound">
      <icons.volume />
      <span>Playing</span>
      <Button size="small" variant="primary" icon={icons.stop} onPress={onStop}>
        Stop
      </Button>
    </div>,
    document.body,
  );
}
