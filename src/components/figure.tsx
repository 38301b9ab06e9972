import type { ReactNode } from 'react';
import { Explain } from './explain.tsx';
import { icons } from './icons.tsx';
import { joinClasses } from './join-classes.ts';

export type FigureTone = 'plain' | 'attention' | 'good';

export interface FigureProps {
  label: string;
  /** Already formatted: `49.8`, `exact`, `–`. */
  value: string;
  unit?: string;
  /** What it means, how it is computed, what is good. */
  explain: ReactNode;
  tone?: FigureTone;
}

const toneSigns = {
  attention: { Sign: icons.caution, words: 'needs attention' },
  good: { Sign: icons.good, words: 'good' },
} as const;

/** One measured figure with its unit, and a button that explains it in place. */
export function Figure({ label, value, unit, explain, tone = 'plain' }: FigureProps) {
  const sign = tone === 'plain' ? undefined : toneSigns[tone];
  return (
    <div
      className={joinClasses('figure', tone !== 'plain' && `figure-${tone}`)}
      role="group"
      aria-label={label}
    >
      <div className="figure-label">
        <span>{label}</span>
        <Explain title={label}>{explain}</Explain>
      </div>
      <div className="figure-value">
        <output>{value}</output>
        {unit && <span className="figure-unit">{unit}</span>}
        {sign && (
          <span className="figure-sign">
            <sign.Sign width="16" height="16" />
            <span className="sr-only">{sign.words}</span>
          </span>
        )}
      </div>
    </div>
  );
}

/** A course of figures that wraps as it must. */
export function FigureStrip({
  label = 'Figures of the table',
  children,
}: {
  label?: string;
  children: ReactNode;
}) {
  return (
    <section className="figure-strip" aria-label={label}>
      {children}
    </section>
  );
}
