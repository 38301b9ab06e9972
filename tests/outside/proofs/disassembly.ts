// Instructions that a processor's objdump shows: counted, not timed.

const instructionLine = /^\s*([0-9a-f]+):\s+(\S+)\s*(.*)$/gm;

function instructionsOf(disassembly: string, name: string) {
  const start = disassembly.indexOf(`<${name}>:`);
  const body = disassembly.slice(start).split(/\n\s*\n/)[0];
  return [...body.matchAll(instructionLine)]
    .map(([, address, mnemonic, operands]) => ({ address: parseInt(address, 16), mnemonic, operands }))
    .filter(({ mnemonic }) => !mnemonic.startsWith('.'));
}

type Instruction = ReturnType<typeof instructionsOf>[number];

/** Calls, and jumps to another function in the place of a call and a return. */
const jump = /^(?:bl?(?:\.[nw])?|jal?|call|tail)$/;

/** So many, with all those of the functions that they call. */
function withCalled(disassembly: string, name: string, instructions: readonly Instruction[]): number {
  const called = instructions.flatMap(({ mnemonic, operands }) => {
    const [, target = name] = (jump.test(mnemonic) && /<([^>+]+)>/.exec(operands)) || [];
    return target === name ? [] : [target];
  });
  return called.reduce((sum, one) => sum + functionInstructions(disassembly, one), instructions.length);
}

/** All instructions of a handler: at least as many as any way through it, which has no loop. */
export const functionInstructions = (disassembly: string, name: string): number =>
  withCalled(disassembly, name, instructionsOf(disassembly, name));

/** Instructions of the loop in a function: from the target of its longest jump back to that jump. */
export function loopInstructions(disassembly: string, name: string): number {
  const all = instructionsOf(disassembly, name);
  const turns = all.flatMap(({ address, operands }, at) => {
    const [target] = new RegExp(String.raw`\b[0-9a-f]+\b(?=\s+<${name})`).exec(operands) ?? [];
    const from = target === undefined ? -1 : all.findIndex((one) => one.address === parseInt(target, 16));
    return from >= 0 && all[from].address <= address ? [all.slice(from, at + 1)] : [];
  });
  const longest = turns.reduce((most, turn) => (turn.length > most.length ? turn : most), []);
  return withCalled(disassembly, name, longest);
}
