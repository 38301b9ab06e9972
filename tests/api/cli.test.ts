import { execFile } from 'node:child_process';
import { mkdir, mkdtemp, readdir, readFile, rm, symlink, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { tableReportSchema } from '../../shared/contract/index.ts';
import { contentOf, renderFiles } from '../../shared/firmware/index.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { expectOneLine, fogJson, fogSignal, stepwell } from '../support/command-line.ts';

let folder: string;
let file: string;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'stepwell-cli-'));
  file = join(folder, 'fog.json');
  await writeFile(file, fogJson());
  // The first call builds the command line where it has to.
  await stepwell(['--help']);
});
afterAll(() => rm(folder, { recursive: true }));

describe('report', () => {
  it('--json prints codes, words, figures, amplitudes and warnings, as the engine has them', async () => {
    const { status, stdout, stderr } = await stepwell(['report', file, '--json']);
    const built = buildTable(fogSignal);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(tableReportSchema.parse(JSON.parse(stdout))).toEqual({
      codes: Array.from(built.codes),
      stored: Array.from(built.stored),
      report: built.report,
      spectrum: Array.from(built.spectrum.amplitudes),
      warnings: [],
    });
  });

  it('reads standard input for -, with or without a byte order mark', async () => {
    const expected = await stepwell(['report', file, '--json']);
    expect(await stepwell(['report', '-', '--json'], { input: fogJson() })).toEqual(expected);
    expect(await stepwell(['report', '-', '--json'], { input: `\ufeff${fogJson()}` })).toEqual(expected);
  });

  it('prints figures with units, aligned, and what was left out', async () => {
    const source = {
      kind: 'harmonics',
      partials: [
        { harmonic: 1, amplitude: 1, phaseDeg: 0 },
        { harmonic: 50, amplitude: 1, phaseDeg: 0 },
      ],
    };
    const { status, stdout } = await stepwell(['report', '-'], { input: fogJson({ source }) });
    expect(status).toBe(0);
    const { snrDb } = buildTable({ ...fogSignal, source }).report;
    expect(stdout).toMatch(/^Fog signal: 100 entries of 10 bits\n/);
    expect(stdout).toMatch(new RegExp(`^SNR +${snrDb?.toFixed(2)} {2}dB`, 'm'));
    expect(stdout).toContain('Warning: source.partials[1]');
    const figures = stdout.split('\n').filter((line) => / (dB|LSB)( |$)/.test(line));
    expect(figures.length).toBeGreaterThan(8);
    expect(new Set(figures.map((line) => line.search(/ (dB|LSB)( |$)/))).size).toBe(1);
  });

  it('ends quietly where its reader stops early', async () => {
    const command = `'${process.execPath}' server/setup/stepwell.mjs report - --json | head -c 20`;
    const input = fogJson({ table: { length: 65_536, bits: 16 } });
    const running = promisify(execFile)('sh', ['-c', command], { cwd: projectFolder });
    running.child.stdin?.end(input);
    const { stdout, stderr } = await running;
    expect(stdout).toHaveLength(20);
    expect(stderr).toBe('');
  });

  it('shows a name that would command a terminal without its effect', async () => {
    const { stdout } = await stepwell(['report', '-'], {
      input: fogJson({ name: 'red \u001b[31m\u009b1m \u202e' }),
    });
    expect(stdout).toMatch(/^red \\u\{1b\}\[31m\\u\{9b\}1m \\u\{202e\}: /);
  });
});

describe('render', () => {
  const expected = (target: string, options: object = {}) =>
    renderFiles(buildTable(fogSignal), target, options, readTemplates());

  it('writes the same bytes as the library, prints their paths and leaves nothing else', async () => {
    const out = join(folder, 'gen', 'deep');
    const { status, stdout, stderr } = await stepwell(['render', file, '--target', 'avr', '--out', out]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    const files = expected('avr');
    expect(stdout).toBe(files.map(({ name }) => `${join(out, name)}\n`).join(''));
    expect((await readdir(out)).sort()).toEqual(files.map(({ name }) => name).sort());
    for (const { name, text } of files) expect(await readFile(join(out, name), 'utf8')).toBe(text);
  });

  it('takes the options of the target as flags', async () => {
    const out = join(folder, 'options');
    const flags = ['--name', 'mist', '--port', 'D', '--high-port', 'B'];
    const { status } = await stepwell(['render', file, '--target', 'avr', ...flags, '--out', out]);
    expect(status).toBe(0);
    for (const { name, text } of expected('avr', { arrayName: 'mist', port: 'D', highPort: 'B' })) {
      expect(await readFile(join(out, name), 'utf8')).toBe(text);
    }
  });

  it('takes clock and pins from a board, where no flag says otherwise', async () => {
    const out = join(folder, 'board');
    const places = ['B.0', 'B.1', 'B.3', 'B.4', 'B.5', 'B.6', 'D.0', 'D.1', 'D.2', 'D.3'].map((place) => {
      const [port, pin] = place.split('.');
      return { port, pin: Number(pin) };
    });
    const ports = [
      { name: 'B', reserved: [{ pin: 2, rest: 'high' }], reservedPins: 'kept' },
      { name: 'D', reserved: [{ pin: 7 }] },
    ];
    const output = { kind: 'ladder', bits: 10, R: 10_000, portMap: { bits: places, ports } };
    const board = join(folder, 'board.json');
    await writeFile(board, JSON.stringify({ schema: 1, name: 'Buoy', clock: { hz: 16_000_000 }, output }));
    const flags = ['--board', board, '--playback', 'timer', '--clock-hz', '1000000'];
    const { status, stderr } = await stepwell(['render', file, '--target', 'avr', ...flags, '--out', out]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    const options = {
      portMap: 'B.0 B.1 B.3 B.4 B.5 B.6 D.0 D.1 D.2 D.3',
      reservedPins: 'B.2=high D.7=low',
      reservedBy: 'kept',
      playback: 'timer',
      clockHz: '1000000',
    };
    for (const { name, text } of expected('avr', options))
      expect(await readFile(join(out, name), 'utf8')).toBe(text);
    // A plain port by hand puts the board's map away.
    const plain = ['--board', board, '--port', 'D', '--high-port', 'B'];
    await stepwell(['render', file, '--target', 'avr', ...plain, '--out', out]);
    for (const { name, text } of expected('avr', { clockHz: '16000000', port: 'D', highPort: 'B' }))
      expect(await readFile(join(out, name), 'utf8')).toBe(text);
    const chip = { schema: 1, name: 'Buoy', clock: { hz: 1e6 }, output: { kind: 'on-chip', bits: 10 } };
    await writeFile(board, JSON.stringify(chip));
    const told = await stepwell(['render', file, '--target', 'avr', '--board', board, '--out', out]);
    expect(told.status).toBe(0);
    expect(told.stderr).toMatch(/^note: not taken from the board: its converter on the chip, .*\n$/);
    await writeFile(board, '{"schema":1,"name":"Buoy","clock":{"hz":-1}}');
    expectOneLine(
      await stepwell(['render', file, '--target', 'avr', '--board', board]),
      /^board\.clock\.hz: -1 is not allowed; allowed: /,
    );
  });

  it('gives bytes as they are to standard output, and refuses several files that nothing could part', async () => {
    const sound = await promisify(execFile)(
      process.execPath,
      [join(projectFolder, 'server/setup/stepwell.mjs'), 'render', file, '--target', 'wav'],
      { encoding: 'buffer' },
    );
    expect(Buffer.compare(sound.stdout, contentOf(expected('wav')[0]))).toBe(0);
    const map = ['--port-map', 'B.0 B.1 B.2 B.3 B.4 B.5 B.6 D.0 D.1 D.2'];
    const { stdout, ...refused } = await stepwell(['render', file, '--target', 'binary', ...map]);
    expect(stdout).toBe('');
    expectOneLine({ stdout, ...refused }, /^--out: nothing is not allowed; allowed: a folder, .*2 files/);
  });

  it('prints the files one after the other, each below a line that names it, where no folder is given', async () => {
    const { status, stdout } = await stepwell(['render', '-', '--target', 'c99'], { input: fogJson() });
    expect(status).toBe(0);
    expect(stdout).toBe(
      expected('c99')
        .map(({ name, text }) => `// file: ${name}\n${text}`)
        .join(''),
    );
  });

  it('replaces what was there, a link included, and never follows it', async () => {
    const out = join(folder, 'links');
    await mkdir(out);
    const precious = join(folder, 'precious.txt');
    await writeFile(precious, 'as it was');
    await symlink(precious, join(out, 'fog_signal.c'));
    await writeFile(join(out, 'fog_signal.h'), 'old');
    const { status } = await stepwell(['render', file, '--target', 'c99', '--out', out]);
    expect(status).toBe(0);
    expect(await readFile(precious, 'utf8')).toBe('as it was');
    for (const { name, text } of expected('c99')) expect(await readFile(join(out, name), 'utf8')).toBe(text);
  });

  it('changes nothing where one of the files cannot be written', async () => {
    const out = join(folder, 'blocked');
    await mkdir(join(out, 'fog_signal.c'), { recursive: true });
    await writeFile(join(out, 'fog_signal.h'), 'old');
    const result = await stepwell(['render', file, '--target', 'c99', '--out', out]);
    expectOneLine(
      result,
      /^--out: the folder ".*" is not allowed; allowed: a file, or nothing, in its place$/,
    );
    expect((await readdir(out)).sort()).toEqual(['fog_signal.c', 'fog_signal.h']);
    expect(await readFile(join(out, 'fog_signal.h'), 'utf8')).toBe('old');
  });

  it.each(['/proc/stepwell', '/dev/null', '/dev/null/x', `/tmp/${'x'.repeat(300)}`])(
    'refuses the folder %.20s',
    async (out) => {
      const result = await stepwell(['render', file, '--target', 'c99', '--out', out]);
      expectOneLine(result, /^--out: ".*", .*, is not allowed; allowed: a folder that can be written to$/);
    },
  );

  it('says on standard error what an export leaves out', async () => {
    const source = {
      kind: 'harmonics',
      partials: [
        { harmonic: 1, amplitude: 1, phaseDeg: 0 },
        { harmonic: 50, amplitude: 1, phaseDeg: 0 },
      ],
    };
    const { status, stderr } = await stepwell(['render', '-', '--target', 'c99'], {
      input: fogJson({ source }),
    });
    expect(status).toBe(0);
    expect(stderr).toMatch(/^warning: source\.partials\[1\].*\n$/);
  });
});

describe('help', () => {
  it('goes to standard output, with status 0', async () => {
    const { status, stdout, stderr } = await stepwell(['render', '--help']);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    for (const flag of ['--target', '--out', '--name', '--port', '--high-port'])
      expect(stdout).toContain(flag);
    expect((await stepwell(['--help'])).stdout).toContain('report');
  });
});
