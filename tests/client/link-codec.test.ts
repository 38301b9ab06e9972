import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decodeWave, encodeWave } from '../../src/features/bench/state/link-codec.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { throughJson, works } from './arbitraries.ts';

const { work: wave } = examples[0];

async function packed(text: string): Promise<string> {
  const stream = new Blob([text]).stream().pipeThrough(new CompressionStream('deflate'));
  return `w1.${Buffer.from(await new Response(stream).arrayBuffer()).toString('base64url')}`;
}

const faultOf = async (fragment: string) => {
  const result = await decodeWave(fragment);
  return 'fault' in result ? result.fault : undefined;
};

describe('a read-only link', () => {
  it('brings back the wave that it was made of', async () => {
    await fc.assert(
      fc.asyncProperty(works, async ({ definition, playback }) => {
        const fragment = await encodeWave({ definition, playback });
        expect(fragment).toMatch(/^w1\.[\w-]+$/);
        expect(await decodeWave(`#${fragment}`)).toEqual({ wave: throughJson({ definition, playback }) });
      }),
      { numRuns: 60 },
    );
  });

  it('carries no more than the wave', async () => {
    const result = await decodeWave(await encodeWave(wave));
    expect(result).toEqual({ wave: { definition: wave.definition, playback: wave.playback } });
  });

  it('stays short enough for mail with the first example', async () => {
    expect((await encodeWave(wave)).length).toBeLessThan(700);
  });

  it('tells that it has been cut or altered, wherever that was', async () => {
    const fragment = await encodeWave(wave);
    await fc.assert(
      fc.asyncProperty(
        fc.integer({ min: 4, max: fragment.length - 1 }),
        fc.constantFrom('A', 'z', '7', '_', ''),
        async (at, other) => {
          fc.pre(fragment[at] !== other);
          const altered =
            other === '' ? fragment.slice(0, at) : fragment.slice(0, at) + other + fragment.slice(at + 1);
          const result = await decodeWave(altered);
          // The last character of base64url may hold bits that no byte uses.
          if ('wave' in result)
            expect([result, at]).toEqual([await decodeWave(fragment), fragment.length - 1]);
          else expect(result.fault).toMatch(/cut or altered|do not belong/);
        },
      ),
    );
  });

  it.each([
    ['', /holds no wave/],
    ['#open=shape', /holds no wave/],
    ['#w2.AAAA', /later version/],
    ['#w1.%%%', /do not belong/],
    ['#w1.AAAAA', /do not belong/],
    ['#w1.', /cut or altered/],
  ])('refuses %j in words', async (fragment, words) => {
    expect(await faultOf(fragment)).toMatch(words);
  });

  it.each([
    ['null', /^The link’s wave is not one that can be built/],
    ['{}', /definition: nothing is not allowed/],
    [JSON.stringify({ ...wave, definition: { ...wave.definition, schema: 2 } }), /schema: 2 is not allowed/],
    [
      JSON.stringify({ ...wave, definition: { ...wave.definition, table: { bits: 17 } } }),
      /table\.bits: 17 is not allowed; allowed: a whole number from 1 to 16/,
    ],
    [JSON.stringify({ definition: wave.definition }), /playback/],
    ['{"definition":', /cut or altered/],
  ])('refuses a whole link around %.40s', async (content, words) => {
    expect(await faultOf(await packed(content))).toMatch(words);
  });

  it('does not unpack more than a request may hold', async () => {
    const bomb = await packed(`"${'0'.repeat(9 * 1024 * 1024)}"`);
    expect(bomb.length).toBeLessThan(20_000);
    expect(await faultOf(bomb)).toMatch(/cut or altered/);
  });

  it('refuses nesting that would end the stack', async () => {
    const deep = '{"kind":"mix","operation":"sum","parts":[{"gain":1,"source":'.repeat(5_000);
    const content = `{"definition":{"schema":1,"name":"deep","source":${deep}1${'}]}'.repeat(5_000)}}}`;
    expect(await faultOf(await packed(content))).toMatch(/nested at most 4 deep/);
  });
});
