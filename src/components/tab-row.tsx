import { useRef, type KeyboardEvent, type ReactNode } from 'react';

export interface TabRowProps<Id extends string = string> {
  /** Spoken name of the row. */
  label?: string;
  tabs: readonly { id: Id; label: ReactNode }[];
  selected: Id;
  onSelect: (id: Id) => void;
  /** Shared with the `TabPanel`s; tells rows on one page apart. */
  group?: string;
}

/** Tabs by the ARIA pattern: arrows, Home and End move and select; one stop in the tab order. */
export function TabRow<Id extends string>({
  label,
  tabs,
  selected,
  onSelect,
  group = 'tabs',
}: TabRowProps<Id>) {
  const row = useRef<HTMLDivElement>(null);

  const walk = (event: KeyboardEvent) => {
    const here = tabs.findIndex((tab) => tab.id === selected);
    const goal = {
      ArrowRight: (here + 1) % tabs.length,
      ArrowLeft: (here - 1 + tabs.length) % tabs.length,
      Home: 0,
      End: tabs.length - 1,
    }[event.key];
    if (goal === undefined) return;
    event.preventDefault();
    onSelect(tabs[goal].id);
    row.current?.querySelectorAll<HTMLElement>('[role=tab]')[goal]?.focus();
  };

  return (
    <div ref={row} role="tablist" aria-label={label} className="tab-row" onKeyDown={walk}>
      {tabs.map((tab) => (
        <button
          key={tab.id}
          type="button"
          role="tab"
          id={`${group}-tab-${tab.id}`}
          aria-controls={`${group}-panel-${tab.id}`}
          aria-selected={tab.id === selected}
          tabIndex={tab.id === selected ? 0 : -1}
          className="tab"
          onClick={() => {
            onSelect(tab.id);
          }}
        >
          {tab.label}
        </button>
      ))}
    </div>
  );
}

/** What the tab of the same id and group shows. Mount only the selected one. */
export function TabPanel({
  id,
  group = 'tabs',
  children,
}: {
  id: string;
  group?: string;
  children: ReactNode;
}) {
  return (
    <div role="tabpanel" id={`${group}-panel-${id}`} aria-labelledby={`${group}-tab-${id}`}>
      {children}
    </div>
  );
}
