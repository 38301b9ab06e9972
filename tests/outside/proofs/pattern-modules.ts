import { pythonFlags, pythonPath } from '../numpy/python.ts';
import { inFolder, run } from '../support/programs.ts';
import { mustEqual } from './cases.ts';
import { patternCases, randomCases } from './pattern-cases.ts';
import { everyEdge, mustPrintEdges, programs, proofsOf, wantedLine } from './pattern-edges.ts';
import type { Proof } from './proof.ts';
import { rustc } from './rust.ts';

const randomCount = 4;

/** rust: a library without std, every warning an error, and a program that prints the same as those in C. */
export async function provePulsesInRust(): Promise<Proof[]> {
  const all = programs('rust', [...patternCases, ...randomCases(randomCount)]);
  const library = `#![no_std]\n${all.map(({ name }) => `pub mod ${name}_pulses;`).join('\n')}\n`;
  const main = `${all
    .map(
      ({ name, ticks }) => `fn run_${name}() {
    use pulses::${name}_pulses::{PulsePlayer, ENDLESS, PULSES, TOTAL_MS};
    print!("{} {} {}", PULSES.len(), TOTAL_MS, u8::from(ENDLESS));
    for one in &PULSES { print!(" {} {} {}", one.on_ms, one.off_ms, one.repeats); }
    let mut player = PulsePlayer::new();
    print!(" {}", (0..9).filter(|_| player.tick()).count());
    for _ in 0..2 {
        let mut before = false;
        player.start();
        for k in 0..${ticks} {
            let now = player.tick();
            if now != before { print!(" {k}"); }
            before = now;
        }
    }
    println!();
}`,
    )
    .join('\n')}
fn main() {
${all.map(({ name }) => `    run_${name}();`).join('\n')}
}
`;
  const files = [
    ...all.flatMap((one) => one.files),
    { name: 'pulses.rs', text: library },
    { name: 'main.rs', text: main },
  ];
  return inFolder(files, async (folder) => {
    const strict = ['--edition', '2021', '-D', 'warnings'];
    await run(rustc, [...strict, '--crate-type', 'rlib', 'pulses.rs'], folder);
    await run(rustc, [...strict, '--extern', 'pulses=libpulses.rlib', 'main.rs', '-o', 'print'], folder);
    mustPrintEdges(await run('./print', [], folder), all, 'rustc');
    return proofsOf(all, 'rustc; Python', everyEdge);
  });
}

/** python: the module's own player. */
export async function provePulsesInPython(): Promise<Proof[]> {
  const all = programs('python', [...patternCases, ...randomCases(4, 12)]);
  const program = `import importlib, sys
sys.path.insert(0, '.')
for name, ticks in ${JSON.stringify(all.map(({ name, ticks }) => [name, ticks]))}:
    module = importlib.import_module(name + '_pulses')
    steps = [module.PULSES[k:k + 5] for k in range(0, len(module.PULSES), 5)]
    found = [module.COUNT, module.TOTAL_MS, int(module.ENDLESS)]
    for step in steps:
        found += [int.from_bytes(step[:2], 'little'), int.from_bytes(step[2:4], 'little'), step[4]]
    player = module.PulsePlayer()
    found.append(sum(player.tick() for _ in range(9)))
    for _ in range(2):
        before = False
        player.start()
        for k in range(ticks):
            now = player.tick()
            if now != before:
                found.append(k)
            before = now
    print(*found)
`;
  const files = [...all.flatMap((one) => one.files), { name: 'print.py', text: program }];
  return inFolder(files, async (folder) => {
    mustPrintEdges(await run(pythonPath, [...pythonFlags, 'print.py'], folder), all, 'python3');
    return proofsOf(all, 'python3', everyEdge);
  });
}

/** json: what a reader that is not ours finds in the document. */
export async function provePulsesInJson(): Promise<Proof[]> {
  const all = programs('json', patternCases);
  const program = `import hashlib, json
for name in ${JSON.stringify(all.map(({ name }) => name))}:
    pulses = json.load(open(name + '.json'))['pulses']
    kept = {'steps': pulses['steps'], 'endless': pulses['endless']}
    text = json.dumps(kept, sort_keys=True, separators=(',', ':'))
    assert pulses['digest'] == 'sha256 ' + hashlib.sha256(text.encode()).hexdigest()
    print(len(kept['steps']), pulses['totalMs'], int(kept['endless']),
          *(n for step in kept['steps'] for n in (step['onMs'], step['offMs'], step['repeats'])))
`;
  const files = [...all.flatMap((one) => one.files), { name: 'print.py', text: program }];
  return inFolder(files, async (folder) => {
    const lines = (await run(pythonPath, [...pythonFlags, 'print.py'], folder)).trim().split('\n');
    all.forEach((one, k) => {
      const wanted = wantedLine(one).slice(0, 3 + 3 * one.pattern.steps.length);
      mustEqual(lines[k]?.split(' ').map(Number), wanted, `json, pulses, ${one.title}`);
    });
    return proofsOf(all, 'python3 json, hashlib', 'every step, whole duration and digest');
  });
}
