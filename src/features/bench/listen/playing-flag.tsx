import { useEffect, useState } from 'react';
import { createPortal } from 'react-dom';
import { Button, icons } from '../../../components/index.ts';

interface PlayingFlagProps {
  /** What holds the panel's own stop; null before the panel has been opened. */
  stopPlace: HTMLElement | null;
  onStop: () => void;
}

/** A stop that stays in sight while the panel's own is closed or scrolled away. */
export function PlayingFlag({ stopPlace, onStop }: PlayingFlagProps) {
  const [isInSight, setIsInSight] = useState(true);
  useEffect(() => {
    if (stopPlace === null) return;
    const observer = new IntersectionObserver(([entry]) => setIsInSight(entry.isIntersecting));
    observer.observe(stopPlace);
    return () => observer.disconnect();
  }, [stopPlace]);
  if (stopPlace !== null && isInSight) return null;
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
