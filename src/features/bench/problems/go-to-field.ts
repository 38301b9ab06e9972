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

/** Brings the field at a path, or the nearest thing that holds it, into sight and gives it the focus. */
export function goToField(path: string): void {
  for (const here of outwards(path)) {
    const spot = document.querySelector<HTMLElement>(`[data-path="${CSS.escape(here)}"]`);
    const field = takeFocus
      .map((kind) => (spot?.matches(kind) ? spot : spot?.querySelector<HTMLElement>(kind)))
      .find((found) => found !== null && found !== undefined);
    if (field) return goTo(field);
  }
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
