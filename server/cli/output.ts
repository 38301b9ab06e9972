import { writeSync } from 'node:fs';

// Node's stream objects for pipes and terminals load its whole network code first: as much time again as the engine
// takes for a table. A command line that writes once does without them.

/** Writes all of a text, or of bytes, to standard output. Whoever reads it may stop early, as `head` does: then we end quietly. */
export function say(text: string | Uint8Array): void {
  writeWhole(1, text);
}

/** Writes a line to standard error. */
export function sayError(line: string): void {
  writeWhole(2, `${line}\n`);
}

function writeWhole(descriptor: 1 | 2, content: string | Uint8Array): void {
  const bytes = typeof content === 'string' ? Buffer.from(content) : content;
  for (let start = 0; start < bytes.length;) {
    try {
      start += writeSync(descriptor, bytes, start);
    } catch (error) {
      const code = error instanceof Error && 'code' in error ? error.code : undefined;
      if (code === 'EPIPE') process.exit();
      if (code !== 'EAGAIN') throw error;
      waitForReader();
    }
  }
}

/** A pipe that another process made non-blocking is full: give its reader a moment. */
function waitForReader(): void {
  Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 2);
}
