let waiting = new Set<() => void>();
let running = new Set<() => void>();
let asked = false;

function run() {
  asked = false;
  [waiting, running] = [running, waiting];
  for (const draw of running) draw();
  running.clear();
}

/** Runs `draw` in the next animation frame, once, however often it was asked for since the last. */
export function onNextFrame(draw: () => void): void {
  waiting.add(draw);
  if (asked) return;
  asked = true;
  requestAnimationFrame(run);
}

export function forgetFrame(draw: () => void): void {
  waiting.delete(draw);
}
