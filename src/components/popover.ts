import { useEffect, useRef, useState, type RefObject } from 'react';

const gapPx = 6;
const marginPx = 8;

/** Below the opener where there is room, else above; always inside the window. */
function place(popover: HTMLElement, opener: HTMLElement) {
  const anchor = opener.getBoundingClientRect();
  const { offsetWidth: width, offsetHeight: height } = popover;
  const fitsBelow = anchor.bottom + gapPx + height + marginPx <= innerHeight;
  const top = fitsBelow ? anchor.bottom + gapPx : Math.max(marginPx, anchor.top - gapPx - height);
  const left = Math.min(Math.max(marginPx, anchor.left - 12), innerWidth - width - marginPx);
  popover.style.top = `${top}px`;
  popover.style.left = `${Math.max(marginPx, left)}px`;
}

interface PlacedPopover {
  opener: RefObject<HTMLButtonElement | null>;
  popover: RefObject<HTMLDivElement | null>;
  isOpen: boolean;
}

/**
 * Follows a `popover="auto"` element: the platform opens it, closes it on Escape or a press elsewhere and gives the
 * focus back; this keeps it beside its opener.
 */
export function usePlacedPopover(): PlacedPopover {
  const opener = useRef<HTMLButtonElement>(null);
  const popover = useRef<HTMLDivElement>(null);
  const [isOpen, setIsOpen] = useState(false);

  useEffect(() => {
    const element = popover.current;
    if (!element) return;
    const follow = () => {
      if (opener.current) place(element, opener.current);
    };
    const onToggle = (event: ToggleEvent) => {
      const opens = event.newState === 'open';
      setIsOpen(opens);
      if (opens) {
        follow();
        addEventListener('scroll', follow, { capture: true, passive: true });
        addEventListener('resize', follow);
      } else {
        removeEventListener('scroll', follow, { capture: true });
        removeEventListener('resize', follow);
      }
    };
    element.addEventListener('toggle', onToggle);
    return () => {
      element.removeEventListener('toggle', onToggle);
      removeEventListener('scroll', follow, { capture: true });
      removeEventListener('resize', follow);
    };
  }, []);

  return { opener, popover, isOpen };
}
