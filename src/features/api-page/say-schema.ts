import type { SchemaNode } from '../../api/openapi.ts';

/** A schema's type in a word or two; the values themselves where there are few. */
export function typeOf({ type, const: only, enum: values, format }: SchemaNode): string {
  if (only !== undefined) return JSON.stringify(only);
  if (values !== undefined) return values.map((value) => JSON.stringify(value)).join(' | ');
  const name = typeof type === 'string' ? type : (type?.join(' | ') ?? 'anything');
  const words = name === 'array' ? 'list' : name;
  return format === undefined ? words : `${words} (${format})`;
}

/** A schema's limits, as mathematics writes them. */
export function limitsOf(schema: SchemaNode): string {
  return [
    ...range(schema.minimum, schema.maximum, ''),
    ...(schema.exclusiveMinimum === undefined ? [] : [`> ${schema.exclusiveMinimum}`]),
    ...(schema.exclusiveMaximum === undefined ? [] : [`< ${schema.exclusiveMaximum}`]),
    ...range(schema.minLength, schema.maxLength, ' characters'),
    ...range(schema.minItems, schema.maxItems, ' items'),
    ...(schema.pattern === undefined ? [] : [`/${schema.pattern}/`]),
    ...(schema.default === undefined ? [] : [`default ${JSON.stringify(schema.default)}`]),
  ].join(', ');
}

function range(least: number | undefined, most: number | undefined, unit: string): string[] {
  if (least !== undefined && most !== undefined) return [`${say(least)}…${say(most)}${unit}`];
  if (least !== undefined) return [`≥ ${say(least)}${unit}`];
  if (most !== undefined) return [`≤ ${say(most)}${unit}`];
  return [];
}

const say = (number: number) => number.toLocaleString('en', { maximumFractionDigits: 10 });
