/** A value that changes in its own time. Who follows it decides when to look; nothing is rendered for it. */
export interface Live<Value> {
  now(): Value;
  /** Calls back after each change; returns what ends it. */
  subscribe(onChange: () => void): () => void;
}

/** A live value that is set from outside. */
export interface SettableLive<Value> extends Live<Value> {
  set(value: Value): void;
}

export function createLive<Value>(first: Value): SettableLive<Value> {
  const listeners = new Set<() => void>();
  let value = first;
  return {
    now: () => value,
    set(next) {
      if (Object.is(next, value)) return;
      value = next;
      for (const listener of listeners) listener();
    },
    subscribe(onChange) {
      listeners.add(onChange);
      return () => listeners.delete(onChange);
    },
  };
}

/** A part of a live value, or what follows from it. `map` runs once a value; a part that stays the same tells nothing. */
export function partOf<Whole, Part>(whole: Live<Whole>, map: (whole: Whole) => Part): Live<Part> {
  let known: { of: Whole; part: Part } | undefined;
  const now = () => {
    const of = whole.now();
    if (known === undefined || !Object.is(known.of, of)) known = { of, part: map(of) };
    return known.part;
  };
  return {
    now,
    subscribe(onChange) {
      let last = now();
      return whole.subscribe(() => {
        if (Object.is(now(), last)) return;
        last = now();
        onChange();
      });
    },
  };
}

/** What follows from two live values. `join` runs once a pair. */
export function joined<One, Other, Both>(
  one: Live<One>,
  other: Live<Other>,
  join: (one: One, other: Other) => Both,
): Live<Both> {
  let pair: readonly [One, Other] | undefined;
  const pairs: Live<readonly [One, Other]> = {
    now() {
      const next = [one.now(), other.now()] as const;
      if (pair === undefined || !next.every((value, index) => Object.is(value, pair?.[index]))) pair = next;
      return pair;
    },
    subscribe(onChange) {
      const ends = [one.subscribe(onChange), other.subscribe(onChange)];
      return () => ends.forEach((end) => end());
    },
  };
  return partOf(pairs, ([first, second]) => join(first, second));
}
