import { createContext, useContext } from 'react';

/** Part of the table in sight, in entries: from ≤ index < to. */
export interface PlotView {
  from: number;
  to: number;
}

type Listener = () => void;

/** What plots over the same entries share: which part is in sight, and the entry under the cursor. */
export interface PlotLink {
  /** `null` while the whole table is in sight. */
  view(): PlotView | null;
  setView(view: PlotView | null): void;
  /** Entry under the cursor; `null` where there is none. */
  cursor(): number | null;
  setCursor(index: number | null): void;
  /** Called after either changes; returns what ends it. */
  subscribe(listener: Listener): () => void;
}

export function createPlotLink(): PlotLink {
  let view: PlotView | null = null;
  let cursor: number | null = null;
  const listeners = new Set<Listener>();
  const publish = () => {
    listeners.forEach((listener) => {
      listener();
    });
  };
  return {
    view: () => view,
    setView(next) {
      if (next?.from === view?.from && next?.to === view?.to) return;
      view = next;
      publish();
    },
    cursor: () => cursor,
    setCursor(next) {
      if (next === cursor) return;
      cursor = next;
      publish();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

/** Plots outside any provider share one link, so that a page with one wave needs no set-up. */
const LinkContext = createContext<PlotLink>(createPlotLink());

/** Ties the plots within it together, and apart from others on the page. */
export const PlotLinkProvider = LinkContext.Provider;

export function usePlotLink(): PlotLink {
  return useContext(LinkContext);
}
