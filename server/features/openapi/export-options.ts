import { z } from 'zod';
import { targets } from '../../../shared/firmware/index.ts';

export const targetField = z
  .enum(targets.map(({ id }) => id))
  .describe(targets.map(({ id, title }) => `${id}: ${title}`).join('; '));

/** Options of all targets, each saying for which it is where not for all; where targets differ, what any of them takes. */
export const exportOptions: Record<string, z.ZodType> = {};

const names = new Set(targets.flatMap(({ options }) => Object.keys(options.shape)));
for (const name of names) {
  const having = targets.filter(({ options }) => name in options.shape);
  const different = new Map(
    having.map(({ options }) => {
      const schema = options.shape[name] as z.ZodType;
      return [JSON.stringify(z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' })), schema];
    }),
  );
  const [first, ...others] = different.values();
  const about = first.description ?? '';
  exportOptions[name] = (others.length === 0 ? first : z.union([first, ...others]))
    .optional()
    .describe(
      having.length === targets.length ? about : `${about} (${having.map(({ id }) => id).join(', ')})`,
    );
}
