import { spawnSync } from 'node:child_process';
import { expect, it } from 'vitest';
import { patternMs } from '../../shared/contract/index.ts';
import { patternDigest } from '../../shared/firmware/index.ts';
import { patternScore } from '../../shared/listening/pattern-score.ts';
import { pythonFlags, pythonPath } from './numpy/python.ts';
import { edgesInPython, exportedWith, longCase, patternCases, randomCases } from './proofs/pattern-cases.ts';

const cases = [...patternCases, longCase, ...randomCases(200)];

it('scores open and close where a Python program has the edges, pass after pass', () => {
  const edges = edgesInPython(cases);
  cases.forEach(({ title, pattern, ticks }, k) => {
    const { events, repeatSeconds } = patternScore(pattern);
    const passes = pattern.endless ? Math.ceil(ticks / patternMs(pattern)) : 1;
    const changes: number[] = [];
    let isOpen = false;
    for (let turn = 0; turn < passes; turn += 1) {
      for (const { atSeconds, ...event } of events) {
        const gate: boolean = event.gate ?? isOpen;
        const ms = (turn * (repeatSeconds ?? 0) + atSeconds) * 1000;
        if (gate !== isOpen && Math.round(ms) < ticks) changes.push(Math.round(ms));
        // A millisecond that a float cannot hold is off by far less than a sample.
        expect(Math.abs(ms - Math.round(ms))).toBeLessThan(1e-6);
        isOpen = gate;
      }
    }
    expect(changes, title).toEqual(edges[k]);
  });
});

it('the digest is that of Python’s hashlib over JSON with sorted keys and no spaces, and stands in the files', () => {
  // For ASCII keys and whole numbers that is RFC 8785's form (§3.2.3: keys in order, no whitespace).
  const program = `import hashlib, json, sys
for pattern in json.load(sys.stdin):
    text = json.dumps(pattern, sort_keys=True, separators=(",", ":"))
    print(hashlib.sha256(text.encode()).hexdigest())`;
  const patterns = cases.slice(0, 40).map(({ pattern }) => pattern);
  const { stdout, status } = spawnSync(pythonPath, [...pythonFlags, '-c', program], {
    input: JSON.stringify(patterns),
    encoding: 'utf8',
  });
  expect(status).toBe(0);
  expect(patterns.map(patternDigest)).toEqual(stdout.trim().split('\n'));
  for (const target of ['c99', 'avr', 'cpp17', 'cortex-m', 'riscv']) {
    const files = exportedWith(patterns[0], target, 'horn').filter(({ name }) => name.includes('_pulses.'));
    expect(files.length).toBeGreaterThan(0);
    for (const { text } of files) expect(text).toContain(patternDigest(patterns[0]));
  }
});
