/** A key for a request that is to be done once, however often it is sent. */
export const newKey = (): string => crypto.randomUUID();
