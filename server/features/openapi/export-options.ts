import { z } from 'zod';
import { targets } from '../../../shared/firmware/index.ts';

export const targetField = z.enum(targets.map(({ id }) => id));

/** Options of all targets, each saying for which it is where not for all. */
export const exportOptions: Record<string, z.ZodType> = {};

for (const { options } of targets) {
  for (const [name, schema] of Object.entries(options.shape)) {
    const having = targets.filter((target) => name in target.options.shape).map(({ id }) => id);
    const about = (schema as z.ZodType).description ?? '';
    exportOptions[name] ??= (schema as z.ZodType)
      .optional()
      .describe(having.length === targets.length ? about : `${about} (${having.join(', ')})`);
  }
}
