const storageKey = 'stepwell.invitation';

/** The invitation that was opened before there was an account to accept it with. It is good for its address alone. */
export const keptInvitation = {
  read(): string | null {
    try {
      return localStorage.getItem(storageKey);
    } catch {
      return null;
    }
  },
  keep(token: string): void {
    try {
      localStorage.setItem(storageKey, token);
    } catch {
      // The link in the mail still works.
    }
  },
  letGo(): void {
    try {
      localStorage.removeItem(storageKey);
    } catch {
      // Nothing was kept.
    }
  },
};
