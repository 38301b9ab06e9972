/** Runs `work` while no other process of this machine holds the lock of that name. */
export function withLock<Result>(
  name: string,
  work: () => Result | Promise<Result>,
  options?: { onWait?: () => void },
): Promise<Result>;
