import { z } from 'zod';
import { engineVersion as thisEngine } from '../../engine-version.ts';
import { canonicalJson } from '../digest.ts';
import { lineEndingOption, nameOptions, packedOption, portMapOptions } from '../options.ts';
import { patternJson, pulsesOption } from '../pattern.ts';
import { defineTarget } from '../target.ts';

/** Definition, codes, words and digest in one JSON document, for tools of one's own. */
export const json = defineTarget({
  id: 'json',
  title: 'JSON with definition, codes and words',
  options: z.strictObject({
    ...nameOptions,
    lineEnding: lineEndingOption,
    packed: packedOption,
    ...portMapOptions,
    pulses: pulsesOption,
  }),
  filesOf: ({ table, layout: { arrays, packedBits }, options, arrayName, digest }) => {
    const { definition, codes, stored, engineVersion = thisEngine } = table;
    const list = (numbers: ArrayLike<number>) => `[${Array.from(numbers).join(',')}]`;
    const facts = {
      nameJson: JSON.stringify(arrayName),
      engineJson: JSON.stringify(engineVersion),
      digest,
      definitionJson: canonicalJson(definition),
      codesJson: list(codes),
      wordsJson: list(stored),
      pulsesJson: patternJson(options.pulses),
      packedBits: packedBits ?? false,
      packedJson: packedBits === undefined ? '' : list(arrays[0].elements),
      ports: arrays.flatMap(({ ports, elements }) =>
        ports.map(({ name }) => ({
          nameJson: JSON.stringify(name),
          wordsJson: list(new Uint32Array(elements)),
        })),
      ),
    };
    return [{ template: 'json/table.json', ending: '.json', facts }];
  },
});
