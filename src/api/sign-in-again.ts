import { createLive } from '../live/index.ts';

type Answer = (hasSignedIn: boolean) => void;

const waiting = createLive<readonly Answer[]>([]);

/**
 * Asks the person to sign in, on top of whatever is on screen; answers whether they have. The shell shows the dialog,
 * one for all that ask.
 */
export const askToSignIn = (): Promise<boolean> =>
  new Promise((resolve) => {
    waiting.set([...waiting.now(), resolve]);
  });

/** What the dialog needs of those who ask. */
export const signInRequests = {
  waiting,
  answer(hasSignedIn: boolean): void {
    const all = waiting.now();
    waiting.set([]);
    for (const one of all) one(hasSignedIn);
  },
};
