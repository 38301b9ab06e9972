/**
 * Notes that are held, in the order in which they were pressed. A pin plays one tone, so the last one pressed sounds,
 * and when it is let go the last of those still held. A holder is whatever presses: a finger, a key, a note of an
 * input; it holds one note at a time.
 */
export type HeldNotes = readonly { readonly holder: string; readonly note: number }[];

/** A holder presses a note, or goes over to it. */
export function pressNote(held: HeldNotes, holder: string, note: number): HeldNotes {
  return [...releaseNote(held, holder), { holder, note }];
}

/** The same list where the holder held none. */
export function releaseNote(held: HeldNotes, holder: string): HeldNotes {
  return held.some((one) => one.holder === holder) ? held.filter((one) => one.holder !== holder) : held;
}

/** Lets go of all whose holder's name begins so. */
export function releaseNotesOf(held: HeldNotes, beginning: string): HeldNotes {
  const isHis = ({ holder }: { holder: string }) => holder.startsWith(beginning);
  return held.some(isHis) ? held.filter((one) => !isHis(one)) : held;
}

/** The one that sounds. */
export function soundingNote(held: HeldNotes): number | null {
  return held.at(-1)?.note ?? null;
}
