import { lazy, Suspense, useEffect } from 'react';
import { watchAccount } from '../api/account-state.ts';
import { signInRequests } from '../api/sign-in-again.ts';
import { useLive } from '../live/index.ts';

const SignInDialog = lazy(async () => ({
  default: (await import('./sign-in-dialog.tsx')).SignInDialog,
}));

/** Keeps watch over who is signed in, and asks to sign in where something needs it. */
export function SignInAgain() {
  useEffect(watchAccount, []);
  const asking = useLive(signInRequests.waiting);
  if (asking.length === 0) return null;
  return (
    <Suspense fallback={null}>
      <SignInDialog />
    </Suspense>
  );
}
