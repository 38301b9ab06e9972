/** Raised whenever the same definition would give other codes or figures. Part of every digest. */
export const engineVersion = '1.0.0';
