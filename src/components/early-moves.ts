/** Early moves are passed on at most this often, in milliseconds: a mouse may tell of a thousand a second. */
const everyMs = 8;

/**
 * Calls back with the moves of a captured pointer as soon as the browser hears of them, which is up to a frame before
 * `pointermove`, until the capture ends. Where a browser does not tell so early, there are none: `pointermove` tells
 * all of them again. Pointer Events Level 3, `pointerrawupdate`.
 */
export function onEarlyMoves(
  element: HTMLElement,
  pointerId: number,
  onMove: (event: PointerEvent) => void,
): void {
  const ending = new AbortController();
  const { signal } = ending;
  let last = -Infinity;
  element.addEventListener(
    'pointerrawupdate',
    (event) => {
      if (!(event instanceof PointerEvent) || event.pointerId !== pointerId) return;
      if (event.timeStamp - last < everyMs) return;
      last = event.timeStamp;
      onMove(event);
    },
    { signal },
  );
  element.addEventListener(
    'lostpointercapture',
    (event) => {
      if (event.pointerId === pointerId) ending.abort();
    },
    { signal },
  );
}
