import { useEffect } from 'react';
import { createLive, useLive } from '../live/index.ts';

/** A field whose text stands for no value that could be taken: its owner goes on with the last one. */
export interface UnreadField {
  readonly inputId: string;
  readonly label: string;
  /** What stands there, and what is allowed. */
  readonly fault: string;
}

const fields = createLive<readonly UnreadField[]>([]);

/** Lists a field for as long as it has a fault. */
export function useUnread(inputId: string, label: string, fault: string | undefined): void {
  useEffect(() => {
    if (fault === undefined) return;
    const field = { inputId, label, fault };
    fields.set([...fields.now(), field]);
    return () => fields.set(fields.now().filter((other) => other !== field));
  }, [inputId, label, fault]);
}

/** All such fields on the page, for a summary of what is wrong. */
export function useUnreadFields(): readonly UnreadField[] {
  return useLive(fields);
}
