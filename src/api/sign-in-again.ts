type Answer = (hasSignedIn: boolean) => void;

let waiting: readonly Answer[] = [];
const listeners = new Set<() => void>();

function publish(next: readonly Answer[]) {
  waiting = next;
  for (const listener of listeners) listener();
}

/**
 * Asks the person to sign in, on top of whatever is on screen; answers whether they have. The shell shows the dialog,
 * one for all that ask.
 */
export const askToSignIn = (): Promise<boolean> =>
  new Promise((resolve) => {
    publish([...waiting, resolve]);
  });

/** What the dialog needs of those who ask. */
export const signInRequests = {
  subscribe(listener: () => void): () => void {
    listeners.add(listener);
    return () => listeners.delete(listener);
  },
  isAsked: () => waiting.length > 0,
  answer(hasSignedIn: boolean): void {
    const all = waiting;
    publish([]);
    for (const one of all) one(hasSignedIn);
  },
};
