import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { GeneratedFile } from '../../../shared/contract/index.ts';
import { contentOf } from '../../../shared/firmware/index.ts';
import { inFolder, run } from '../support/programs.ts';
import { exported, tone } from '../support/tables.ts';
import { exportCases, mustEqual, mustPrint, tableCases, type Exported } from './cases.ts';
import { each, type Proof } from './proof.ts';

/** Puts every file of every case into a folder of its own, does some work there. */
function withFiles<Result>(
  cases: readonly Exported[],
  work: (folder: string) => Promise<Result>,
): Promise<Result> {
  return inFolder([], async (folder) => {
    await writeAll(
      cases.flatMap(({ files }) => files),
      folder,
    );
    return work(folder);
  });
}

const writeAll = (files: readonly GeneratedFile[], folder: string) =>
  Promise.all(files.map((file) => writeFile(join(folder, file.name), contentOf(file))));

/** Runs a program in Python, with the cases as data. */
const python = (folder: string, program: string, cases: readonly Exported[]) => {
  const about = cases.map(({ name, files, expected, table }) => ({
    name,
    files: files.map((file) => file.name),
    ports: expected.map(({ port }) => port),
    count: expected[0].words.length,
    bits: table.definition.table.bits,
    signed: table.definition.table.coding === 'twos-complement',
  }));
  return run(
    'python3',
    ['-c', `import json, sys\ncases = json.loads(sys.argv[1])\n${program}`, JSON.stringify(about)],
    folder,
  );
};

/** The module as the interpreter reads it; bytes literals, imported under a name of their own. */
export async function provePython(): Promise<Proof[]> {
  const cases = exportCases('python');
  return withFiles(cases, async (folder) => {
    const program = `
import importlib
sys.path.insert(0, '.')
for case in cases:
    module = importlib.import_module(case['name'])
    assert module.LENGTH == case['count']
    for port in case['ports']:
        read = getattr(module, 'word_' + port if port else 'word')
        assert isinstance(getattr(module, 'WORDS_' + port.upper() if port else 'WORDS'), bytes)
        print(case['name'], port or '-', *(read(k) for k in range(case['count'])))
`;
    mustPrint(await python(folder, program, cases), cases);
    return each(cases, 'python3', 'imported; its reader gives every entry');
  });
}

/** Words of a whole wave from stored elements: what a fold or packing leaves to the reader, written once more here. */
const unfold = `
def entries(case, raw, bits):
    if 'packed' in case['name']:
        width = 4 if bits <= 4 else 12
        whole = int.from_bytes(bytes(raw), 'little')
        stored = [whole >> width * k & (1 << width) - 1 for k in range(case['stored'])]
    else:
        width, stored = bits, list(raw)
    if case['signed']:
        stored = [w - (1 << width) if w >> (width - 1) & 1 else w for w in stored]
    if case['folded']:
        top = (1 << bits) - 1
        half = stored + stored[::-1]
        stored = half + [-1 - w if case['two'] else top - w for w in half]
    return stored
for case in cases:
    case['folded'] = len(case['name'].split('_')) > 1 and case['name'] in ('wave_fold', 'wave_packed4')
    case['two'] = case['signed']
    case['stored'] = case['count'] // 4 if case['folded'] else case['count']
`;

/** Bytes of either order. */
export async function proveBinary(): Promise<Proof[]> {
  for (const endianness of ['little', 'big']) {
    const cases = exportCases('binary', { endianness });
    const program = `${unfold}
for case in cases:
    for port, name in zip(case['ports'], case['files']):
        data = open(name, 'rb').read()
        size = 1 if port or 'packed' in case['name'] or case['bits'] <= 8 else 2
        raw = [int.from_bytes(data[k:k + size], '${endianness}') for k in range(0, len(data), size)]
        mask = (1 << case['bits']) - 1
        words = raw if port else entries(case, raw if size == 1 else [w & mask for w in raw], case['bits'])
        print(case['name'], port or '-', *words)
`;
    await withFiles(cases, async (folder) => mustPrint(await python(folder, program, cases), cases));
  }
  return each(exportCases('binary'), 'python3', 'every entry from the bytes, in either order');
}

/** srec_cat reads the records, checks their sums and gives the bytes: those of the binary target, at the address. */
export async function proveIntelHex(): Promise<Proof[]> {
  const address = 0x0801_fff8;
  const cases = exportCases('intel-hex', { address: '0x0801FFF8' });
  const images = exportCases('binary');
  return inFolder([], async (folder) => {
    await writeAll(
      [...cases, ...images].flatMap(({ files }) => files),
      folder,
    );
    for (const [at, { files, title }] of cases.entries()) {
      for (const [index, { name }] of files.entries()) {
        const back = ['-intel', '-offset', `-${address}`, '-o', 'back.bin', '-binary'];
        await run('srec_cat', [name, ...back], folder);
        const info = await run('srec_info', [name, '-intel'], folder);
        const size = contentOf(images[at].files[index]).length;
        const range = /Data:\s+([0-9A-F]+) - ([0-9A-F]+)/.exec(info);
        if (
          parseInt(range?.[1] ?? '', 16) !== address ||
          parseInt(range?.[2] ?? '', 16) !== address + size - 1
        ) {
          throw new Error(`${title}: ${info}`);
        }
        await run('cmp', ['back.bin', images[at].files[index].name], folder);
      }
    }
    return each(
      cases,
      'srec_cat, srec_info',
      'sums and addresses over the end of a 64 KiB; the binary target’s bytes',
    );
  });
}

/** $readmemh of a simulator. */
export async function proveVerilogMemh(): Promise<Proof[]> {
  const cases = exportCases('verilog-memh');
  const bench = `module bench;
integer k;
${cases
  .flatMap(({ name, files, table, expected }) =>
    files.map((file, index) => {
      const port = expected[index].port;
      const [, count, width] = /(\d+) words of (\d+) bits/.exec(file.text) ?? [];
      void table;
      return `reg [${Number(width) - 1}:0] ${name}_${port || 'x'} [0:${Number(count) - 1}];
initial begin
  $readmemh("${file.name}", ${name}_${port || 'x'});
  $write("${name} ${port || '-'}");
  for (k = 0; k < ${count}; k = k + 1) $write(" %0d", ${name}_${port || 'x'}[k]);
  $write("\\n");
end`;
    }),
  )
  .join('\n')}
endmodule
`;
  return withFiles(cases, async (folder) => {
    await writeFile(join(folder, 'bench.v'), bench);
    await run('iverilog', ['-g2005', '-Wall', '-o', 'bench', 'bench.v'], folder);
    const said = await run('./bench', [], folder);
    await writeFile(join(folder, 'said.txt'), said);
    const program = `${unfold}
said = {tuple(line.split()[:2]): [int(w) for w in line.split()[2:]] for line in open('said.txt')}
for case in cases:
    for port in case['ports']:
        raw = said[case['name'], port or '-']
        print(case['name'], port or '-', *(raw if port else entries(case, raw, case['bits'])))
`;
    mustPrint(await python(folder, program, cases), cases);
    return each(cases, 'iverilog', '$readmemh fills the memory without a warning; every entry of it');
  });
}

/** The csv module of Python's library, by RFC 4180. */
export async function proveCsv(): Promise<Proof[]> {
  const cases = exportCases('csv');
  return withFiles(cases, async (folder) => {
    const program = `import csv
${unfold}
for case in cases:
    rows = list(csv.DictReader(open(case['files'][0], newline='')))
    assert [int(row['index']) for row in rows] == list(range(case['stored']))
    for port in case['ports']:
        raw = [int(row['port_' + port if port else 'word']) for row in rows]
        case['signed'] = False
        print(case['name'], port or '-', *(raw if port else entries(case, raw, case['bits'])))
`;
    mustPrint(await python(folder, program, cases), cases);
    return each(cases, 'python3 csv', 'every row, by column names');
  });
}

/** The json module of Python's library, and hashlib for the digest of what the document itself holds. */
export async function proveJson(): Promise<Proof[]> {
  const cases = exportCases('json');
  return withFiles(cases, async (folder) => {
    const program = `${unfold}
for case in cases:
    document = json.load(open(case['files'][0]))
    assert document['name'] == case['name'] and len(document['codes']) == case['count']
    for port in case['ports']:
        if port:
            words = document['ports'][port.upper()]
        elif 'packed' in document:
            words = entries(case, document['packed']['bytes'], case['bits'])
        else:
            case['signed'] = False
            words = entries(case, document['words'], case['bits'])
        print(case['name'], port or '-', *words)
`;
    mustPrint(await python(folder, program, cases), cases);
    return each(cases, 'python3 json', 'every word, packed byte and port’s word');
  });
}

/** Sox reads the sound: rate, length and, shifted back, every code. */
export async function proveWav(): Promise<Proof[]> {
  const proofs: Proof[] = [];
  const short = { title: '100 × 6, three times over', definition: tone({ length: 101, bits: 6 }) };
  for (const { title, definition, repeats } of [
    ...[tableCases.plain, tableCases.signed, tableCases.long, tableCases.fold].map((one) => ({
      ...one,
      repeats: 1,
    })),
    { ...short, repeats: 3 },
  ]) {
    const { table, files } = exported(definition, 'wav', { sampleRateHz: '44100', repeats: String(repeats) });
    const { bits } = table.definition.table;
    await inFolder([], async (folder) => {
      await writeAll(files, folder);
      const said = await run('sox', ['--info', files[0].name], folder);
      if (!/Channels\s*: 1\n/.test(said) || !/Sample Rate\s*: 44100\n/.test(said)) throw new Error(said);
      const bytes = bits <= 8 ? 1 : 2;
      const encoding = bytes === 1 ? 'unsigned-integer' : 'signed-integer';
      await run(
        'sox',
        [files[0].name, '-t', 'raw', '-e', encoding, '-b', String(8 * bytes), 'raw.bin'],
        folder,
      );
      const text = await run(
        'od',
        ['-An', '-v', '-w1', bytes === 1 ? '-tu1' : '-td2', ...(bytes === 1 ? [] : ['-w2']), 'raw.bin'],
        folder,
      );
      const codes = text
        .trim()
        .split(/\s+/)
        .map((sample) =>
          bytes === 1 ? Number(sample) >> (8 - bits) : (Number(sample) + 32_768) >> (16 - bits),
        );
      const once = Array.from(table.codes);
      mustEqual(codes, Array.from({ length: repeats }, () => once).flat(), title);
    });
    proofs.push({ case: title, tool: 'sox', proven: 'rate, channel, and every code' });
  }
  return proofs;
}
