/** A text that could not be taken on the bench yet; it is kept for this tab, however often the page is left. */
const storageKey = 'stepwell.bench.text';

let kept: string | null | undefined;

export function readKeptText(): string | null {
  if (kept !== undefined) return kept;
  try {
    kept = sessionStorage.getItem(storageKey);
  } catch {
    kept = null;
  }
  return kept;
}

/** Keeps a text, or with `null` lets it go once the bench has it. */
export function keepText(text: string | null): void {
  kept = text;
  try {
    if (text === null) sessionStorage.removeItem(storageKey);
    else sessionStorage.setItem(storageKey, text);
  } catch {
    // It then lasts as long as the page.
  }
}
