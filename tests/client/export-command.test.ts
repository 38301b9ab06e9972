import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { Command } from 'commander';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { tabulate } from '../../shared/build-table.ts';
import {
  contentOf,
  flagOf,
  optionApplies,
  optionGroups,
  optionOf,
  targetOf,
  targets,
  type Target,
} from '../../shared/firmware/index.ts';
import { addRender } from '../../server/cli/render-command.ts';
import {
  commandFor,
  definitionFileName,
  renderExport,
} from '../../src/features/bench/export/render-export.ts';
import { optionLabels } from '../../src/components/code/option-words.ts';
import { targetTitles } from '../../src/features/bench/export/target-titles.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import type { TableAnswer } from '../../src/workers/engine-messages.ts';

/** For each option a value that is not its default and, where it is text, one that a shell must not touch. */
const values: Readonly<Record<string, string>> = {
  arrayName: 'buoyTone',
  arrayPrefix: 'nf_',
  licenceLine: "Ninth Fathom's own; $HOME stays as it is",
  port: 'D',
  highPort: 'C',
  columns: '7',
  portMap: '',
  reservedPins: '',
  playback: 'timer',
  clockHz: '1000000',
  compare: '999',
  countsPerWord: '700',
  toneMilliHz: '100000',
  secondToneMilliHz: '200000',
  idleCode: '3',
  rampWords: '4',
  dmaBits: '32',
  portAddress: '0x40020C14',
  timeAddress: '0x10',
  compareAddress: '0x20',
  address: '0x0801FFF8',
  sampleRateHz: '44100',
  repeats: '2',
  pulses: '200/100x3 500/0 endless',
};

/** A target that can play does not do so from packed words; what has a map is not packed. */
const fitting = ({ options }: Target): Readonly<Record<string, string>> =>
  'portMap' in options.shape && 'playback' in options.shape
    ? {
        packed: 'no',
        portMap: 'B.0 B.1 B.2 B.3 B.4 B.5 B.6 B.7 B.9 B.10',
        reservedPins: 'B.8=high B.11=low',
      }
    : {};
/** Pins of the one target whose ports have eight. */
const avrPins = { portMap: 'B.0 B.1 B.3 B.4 B.5 B.6 D.0 D.1 D.2 D.3', reservedPins: 'B.2=high D.7=low' };

function valueOf(option: string, schema: z.core.$ZodType): string {
  if (option in values) return values[option];
  if (schema instanceof z.ZodDefault || schema instanceof z.ZodOptional)
    return valueOf(option, schema.unwrap());
  if (schema instanceof z.ZodEnum) return String(schema.options.at(-1));
  throw new Error(`This test needs a value for the option ${option}.`);
}

const optionsOf = (target: Target) => ({
  ...Object.fromEntries(
    Object.entries(target.options.shape)
      .map(([name, schema]) => [name, valueOf(name, schema)])
      .filter(([, value]) => value !== ''),
  ),
  ...fitting(target),
  ...(target.id === 'avr' ? avrPins : {}),
});

const name = 'Tone of 10 bits';
const table = tabulate({
  ...examples[0].work.definition,
  name,
  table: { ...examples[0].work.definition.table, bits: 10 },
}) as TableAnswer;

let folder: string;
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'stepwell-flags-'));
  await writeFile(join(folder, definitionFileName(name)), JSON.stringify(table.definition));
});
afterAll(() => rm(folder, { recursive: true }));

/** The words of a command as a POSIX shell splits it. */
async function wordsOf(command: string): Promise<string[]> {
  const { stdout } = await promisify(execFile)('sh', ['-c', `printf '%s\\0' ${command}`]);
  return stdout.split('\0').slice(0, -1);
}

it('targets have the titles that the closed flight shows', () => {
  expect(targetTitles).toEqual(Object.fromEntries(targets.map(({ id, title }) => [id, title])));
});

it('every option of every target has one place in the groups that forms show, and words for it', () => {
  const grouped = optionGroups.flatMap(({ options }) => options);
  expect(new Set(grouped).size).toBe(grouped.length);
  const named = targets.flatMap(({ options }) => Object.keys(options.shape));
  expect([...new Set(named)].sort()).toEqual([...grouped].sort());
  expect(Object.keys(optionLabels).sort()).toEqual([...grouped].sort());
});

it('options that mean nothing as others are set are not offered', () => {
  const applying = (given: Record<string, string>) =>
    optionGroups
      .flatMap(({ options }) => options)
      .filter((name) => name in targetOf('avr').options.shape)
      .filter((name) => optionApplies(name, (option) => given[option] ?? ''));
  const loop = applying({ playback: 'loop' });
  expect(loop).toEqual(expect.arrayContaining(['port', 'highPort', 'portMap', 'unroll']));
  for (const name of ['reservedPins', 'compare', 'toneMilliHz', 'rampWords'])
    expect(loop).not.toContain(name);
  const once = applying({ playback: 'once', portMap: 'B.0' });
  expect(once).toEqual(expect.arrayContaining(['reservedPins', 'compare', 'idleCode', 'rampWords']));
  for (const name of ['port', 'unroll', 'toneMilliHz']) expect(once).not.toContain(name);
});

describe.each(targets.map((target) => [target.id, target] as const))('options of %s', (id, target) => {
  it('each have a flag of their own that leads back to them', () => {
    const names = Object.keys(target.options.shape);
    const flags = names.map(flagOf);
    expect(flags.map(optionOf)).toEqual(names);
    expect(new Set([...flags, '--target', '--out', '--help']).size).toBe(names.length + 3);
    for (const flag of flags) expect(flag).toMatch(/^--[a-z][a-z0-9]*(-[a-z0-9]+)*$/);
  });

  it('all reach the command line, which then writes the files of the bench', async () => {
    const options = optionsOf(target);
    const shown = renderExport(table, id, options);
    if (!('files' in shown)) throw new Error(JSON.stringify(shown.problems));
    const words = await wordsOf(commandFor(name, id, options));
    expect(words.slice(0, 5)).toEqual(['npm', 'run', '--silent', 'stepwell', '--']);
    const [render, file, ...flags] = words.slice(5);
    expect([render, flags.slice(-2)]).toEqual(['render', ['--out', '.']]);

    const said = vi.spyOn(process.stdout, 'write').mockReturnValue(true);
    const command = new Command();
    addRender(command);
    await command.parseAsync([join(folder, file), ...flags.slice(0, -1), join(folder, id)], { from: 'user' });
    said.mockRestore();
    for (const file of shown.files)
      expect(Buffer.compare(await readFile(join(folder, id, file.name)), contentOf(file))).toBe(0);
  });
});
