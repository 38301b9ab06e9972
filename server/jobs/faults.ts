/** A job that took more time or memory than it may; its worker has been ended. */
export class JobOverrun extends Error {
  override readonly name = 'JobOverrun';
}

/** More jobs are waiting than will be served in good time. */
export class JobQueueFull extends Error {
  override readonly name = 'JobQueueFull';
}
