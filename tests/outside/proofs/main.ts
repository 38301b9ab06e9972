import { writeFile } from 'node:fs/promises';
import { differencesFrom, provers, storedProofs } from './matrix.ts';
import type { Proof } from './proof.ts';

// npm run proof [-- TARGET …] [--store]: target × case × tool, measured now; fails where that is not what is stored.

const given = process.argv.slice(2);
const isStoring = given.includes('--store');
const asked = given.filter((word) => word !== '--store');
const unknown = asked.filter((target) => !Object.hasOwn(provers, target));
if (unknown.length > 0) {
  console.error(`${unknown.join(', ')}: no such target; there are ${Object.keys(provers).join(', ')}`);
  process.exit(2);
}

const found: Record<string, readonly Proof[]> = { ...storedProofs };
let faults = 0;
let count = 0;
for (const [target, prove] of Object.entries(provers)) {
  if (asked.length > 0 && !asked.includes(target)) continue;
  const start = performance.now();
  try {
    const proofs = await prove();
    const seconds = ((performance.now() - start) / 1000).toFixed(1);
    console.log(`\n${target} (${proofs.length} proofs, ${seconds} s)`);
    proofs.forEach((proof) => console.log(`  ${rowOf(proof)}`));
    found[target] = proofs;
    count += proofs.length;
    const differences = isStoring ? [] : differencesFrom(storedProofs[target], proofs);
    differences.forEach((difference) => console.log(`  DIFFERS ${difference}`));
    faults += differences.length;
  } catch (error) {
    console.log(`\n${target} FAILED: ${error instanceof Error ? error.message : String(error)}`);
    faults += 1;
  }
}
if (isStoring && faults === 0) {
  const place = new URL('../../../shared/firmware/proofs.json', import.meta.url);
  await writeFile(place, `${JSON.stringify(found, null, 2)}\n`);
}
console.log(`\n${count} proofs, ${faults} faults`);
process.exitCode = faults > 0 ? 1 : 0;

function rowOf({
  case: title,
  tool,
  proven,
  cyclesPerWord,
  handlerCycles,
  instructions,
  tickCycles,
}: Proof): string {
  const figures = [
    cyclesPerWord && `${cyclesPerWord} cycles a word`,
    handlerCycles && `handler ${handlerCycles} cycles`,
    instructions && `${instructions} instructions`,
    tickCycles && `a tick at most ${tickCycles} cycles`,
  ].filter(Boolean);
  return [title.padEnd(58), tool, proven, ...figures].join(' · ');
}
