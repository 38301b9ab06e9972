import type { FlightId } from './field-names.ts';

/** Paths from the field outwards: `source.partials[3].x`, `source.partials[3]`, `source.partials`, `source`. */
function* outwards(path: string): Generator<string> {
  for (let here = path; here !== ''; here = here.replace(/(^|\.)\w+$|\[\d+\]$/, '')) {
    yield here;
    if (!/[.[]/.test(here)) return;
  }
}

/** Fields first: an explanation's button may stand before its field. */
const takeFocus = ['input, select, textarea', 'button, [tabindex="0"]'];

/** A field may come into the page only once what holds it has been opened and loaded: longest wait in milliseconds. */
const patienceMs = 5_000;

/** Brings the field at a path, or the nearest thing that holds it, into sight and gives it the focus. */
export function goToField(path: string): void {
  for (const here of outwards(path)) {
    const field = fieldAt(here);
    if (field !== undefined) {
      goTo(field);
      if (here !== path) goOnceThere(path);
      return;
    }
    const holder = document.querySelector<HTMLDetailsElement>(`details[data-holds~="${CSS.escape(here)}"]`);
    if (holder !== null) {
      holder.open = true;
      return goOnceThere(here);
    }
  }
  goOnceThere(path);
}

function fieldAt(path: string): HTMLElement | undefined {
  const spot = document.querySelector<HTMLElement>(`[data-path="${CSS.escape(path)}"]`);
  return takeFocus
    .map((kind) => (spot?.matches(kind) ? spot : spot?.querySelector<HTMLElement>(kind)))
    .find((found) => found !== null && found !== undefined);
}

let endLastWait = () => {};

/** Goes to a field as soon as it is in the page, unless something else has been done by then. */
function goOnceThere(path: string): void {
  endLastWait();
  const ends = new AbortController();
  const observer = new MutationObserver(() => {
    const field = fieldAt(path);
    if (field === undefined) return;
    endLastWait();
    goTo(field);
  });
  const timer = setTimeout(() => endLastWait(), patienceMs);
  endLastWait = () => {
    ends.abort();
    observer.disconnect();
    clearTimeout(timer);
  };
  observer.observe(document.body, { childList: true, subtree: true });
  for (const deed of ['keydown', 'pointerdown'] as const)
    addEventListener(deed, endLastWait, { signal: ends.signal, capture: true });
}

/** The same for an input by its id. */
export function goToInput(inputId: string): void {
  const input = document.getElementById(inputId);
  if (input !== null) goTo(input);
}

/** The flight that an input stands in; `null` where it stands above them all. */
export function flightOfInput(inputId: string): FlightId | null {
  return (document.getElementById(inputId)?.closest('.flight')?.id as FlightId | undefined) ?? null;
}

function goTo(field: HTMLElement): void {
  field.scrollIntoView({ block: 'center' });
  field.focus({ preventScroll: true });
}
