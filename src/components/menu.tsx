import { useEffect, useId, type KeyboardEvent, type ReactNode } from 'react';
import { icons, type Icon } from './icons.tsx';
import { usePlacedPopover } from './popover.ts';

export interface MenuItem {
  id: string;
  label: string;
  icon?: Icon;
  onSelect: () => void;
}

export interface MenuProps {
  /** Spoken name of the button and of the list. */
  label: string;
  items: readonly MenuItem[];
  /** Words on the button; without them it shows the icon alone. */
  children?: ReactNode;
  icon?: Icon;
}

/** A short list of actions behind one button, by the ARIA menu-button pattern. */
export function Menu({ label, items, children, icon: IconDrawing = icons.more }: MenuProps) {
  const id = useId();
  const { opener, popover, isOpen } = usePlacedPopover();
  const entries = () => [...(popover.current?.querySelectorAll<HTMLElement>('[role=menuitem]') ?? [])];

  useEffect(() => {
    if (isOpen) popover.current?.querySelector<HTMLElement>('[role=menuitem]')?.focus();
  }, [isOpen, popover]);

  const walk = (event: KeyboardEvent) => {
    const list = entries();
    const here = list.indexOf(document.activeElement as HTMLElement);
    const step = { ArrowDown: here + 1, ArrowUp: here - 1 + list.length, Home: 0, End: list.length - 1 }[
      event.key
    ];
    const byLetter =
      event.key.length === 1
        ? list.findIndex((entry) => entry.textContent.toLowerCase().startsWith(event.key.toLowerCase()))
        : -1;
    if (event.key === 'Tab') popover.current?.hidePopover();
    const goal = step === undefined ? list[byLetter] : list[step % list.length];
    if (!goal) return;
    event.preventDefault();
    goal.focus();
  };

  return (
    <>
      <button
        ref={opener}
        type="button"
        className={children ? 'button button-quiet button-small' : 'icon-button icon-button-small'}
        popoverTarget={id}
        aria-haspopup="menu"
        aria-expanded={isOpen}
        aria-label={label}
        title={label}
        onKeyDown={(event) => {
          if (event.key !== 'ArrowDown') return;
          event.preventDefault();
          popover.current?.showPopover();
        }}
      >
        {(!children || IconDrawing !== icons.more) && <IconDrawing />}
        {children}
      </button>
      <div
        ref={popover}
        id={id}
        popover="auto"
        role="menu"
        aria-label={label}
        className="menu-sheet"
        onKeyDown={walk}
      >
        {items.map((item) => (
          <button
            key={item.id}
            type="button"
            role="menuitem"
            tabIndex={-1}
            className="menu-item"
            onClick={() => {
              popover.current?.hidePopover();
              opener.current?.focus();
              item.onSelect();
            }}
          >
            {item.icon && <item.icon width="16" height="16" />}
            {item.label}
          </button>
        ))}
      </div>
    </>
  );
}
