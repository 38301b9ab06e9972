/** A fair coin of the browser's cryptographic generator. */
export const drawCoin = (): boolean => crypto.getRandomValues(new Uint8Array(1))[0] >= 128;
