import { useId, type ReactNode } from 'react';
import { icons } from './icons.tsx';

export interface FlightProps {
  /** 1…4: how deep the flight lies. */
  number: 1 | 2 | 3 | 4;
  title: string;
  /** One line that tells the flight's settings while it is closed. */
  summary: ReactNode;
  isOpen: boolean;
  onToggle: (isOpen: boolean) => void;
  children: ReactNode;
  /** Anchor for links and for the URL. */
  id: string;
}

/** One flight of the stairs: a tread to step on, and behind it what is set there. */
export function Flight({ number, title, summary, isOpen, onToggle, children, id }: FlightProps) {
  const bodyId = useId();
  return (
    <section
      id={id}
      className="flight"
      data-flight={number}
      data-open={isOpen ? '' : undefined}
      aria-labelledby={`${bodyId}-title`}
    >
      <h2 className="flight-head">
        <button
          type="button"
          className="flight-tread"
          aria-expanded={isOpen}
          aria-controls={bodyId}
          onClick={() => {
            onToggle(!isOpen);
          }}
        >
          <span className="flight-number" aria-hidden="true">
            {number}
          </span>
          <span className="flight-words">
            <span id={`${bodyId}-title`} className="flight-title">
              {title}
            </span>
            <span className="flight-summary">{summary}</span>
          </span>
          <icons.chevron className="flight-chevron" />
        </button>
      </h2>
      <div id={bodyId} className="flight-body" hidden={!isOpen}>
        {children}
      </div>
    </section>
  );
}

/** The whole stair: flights between the hatched stone they are cut from and the water they go down to. */
export function Flights({
  label = 'Settings, from the shape down to the export',
  children,
}: {
  label?: string;
  children: ReactNode;
}) {
  return (
    <div className="flights" role="group" aria-label={label}>
      {children}
      <div className="flights-water" aria-hidden="true" />
    </div>
  );
}
