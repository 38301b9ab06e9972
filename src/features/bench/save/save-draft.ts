import { z } from 'zod';
import { newKey } from '../../../api/new-key.ts';

const draftSchema = z.strictObject({
  /** As typed; null while nothing was: the wave's own name then. */
  title: z.string().nullable(),
  tags: z.string(),
  note: z.string(),
  team: z.string().nullable(),
  /** The request that was sent last, as far as it tells one from another, and its key. */
  sent: z.strictObject({ print: z.string(), key: z.string() }).nullable(),
});

/** What was typed for a save that has not got through yet. */
export type SaveDraft = z.infer<typeof draftSchema>;

export const emptyDraft: SaveDraft = { title: null, tags: '', note: '', team: null, sent: null };

const storageKey = 'stepwell.bench.save-draft';

/** Kept for this tab, so that a reload or a round by the sign-in loses nothing typed. */
export function readDraft(): SaveDraft {
  try {
    return draftSchema.parse(JSON.parse(sessionStorage.getItem(storageKey) ?? 'null'));
  } catch {
    return emptyDraft;
  }
}

export function writeDraft(draft: SaveDraft): void {
  try {
    sessionStorage.setItem(storageKey, JSON.stringify(draft));
  } catch {
    // It then lasts as long as the dialog.
  }
}

/** The draft with a key for a request: the same for the same request, so that it is done once however often it is sent. */
export async function withKey(draft: SaveDraft, request: unknown, make = newKey) {
  const print = await printOf(request);
  const sent = draft.sent?.print === print ? draft.sent : { print, key: make() };
  return { draft: { ...draft, sent }, key: sent.key };
}

/** SHA-256: a definition may be large, and the draft need not hold it twice. */
async function printOf(request: unknown): Promise<string> {
  const bytes = new TextEncoder().encode(JSON.stringify(request));
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
