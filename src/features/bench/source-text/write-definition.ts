/** A list or an object that fits into a line of so many characters stands on one. */
const lineWidth = 64;

/**
 * Writes a definition as JSON for reading: two spaces a step, small objects on one line, long lists of numbers as many
 * to a line as fit. It reads back to the same value.
 */
export function writeDefinition(definition: unknown): string {
  return `${write(definition, '')}\n`;
}

function write(value: unknown, indent: string): string {
  const plain = JSON.stringify(value) ?? 'null';
  if (typeof value !== 'object' || value === null) return plain;
  const inner = `${indent}  `;
  if (Array.isArray(value) && value.every((item) => typeof item === 'number'))
    return writeNumbers(value, indent);
  // Commas and colons get a blank each, so the line comes out a little longer than the plain form.
  if (plain.length <= lineWidth - indent.length && isFlat(value)) return onOneLine(value);
  const parts = Array.isArray(value)
    ? value.map((item) => write(item, inner))
    : entriesOf(value).map(([key, item]) => `${JSON.stringify(key)}: ${write(item, inner)}`);
  const [open, close] = Array.isArray(value) ? '[]' : '{}';
  return parts.length === 0
    ? open + close
    : `${open}\n${inner}${parts.join(`,\n${inner}`)}\n${indent}${close}`;
}

/** Fields that stand for nothing are no part of JSON. */
function entriesOf(value: object): [string, unknown][] {
  return Object.entries(value).filter(([, item]) => item !== undefined);
}

function isFlat(value: object): boolean {
  return Object.values(value).every((item) => typeof item !== 'object' || item === null);
}

function onOneLine(value: object): string {
  if (Array.isArray(value)) return `[${value.map((item) => JSON.stringify(item)).join(', ')}]`;
  const parts = entriesOf(value).map(([key, item]) => `${JSON.stringify(key)}: ${JSON.stringify(item)}`);
  return parts.length === 0 ? '{}' : `{ ${parts.join(', ')} }`;
}

function writeNumbers(numbers: readonly number[], indent: string): string {
  const words = numbers.map((number) => JSON.stringify(number));
  const line = words.join(', ');
  if (line.length <= lineWidth - indent.length) return `[${line}]`;
  const inner = `${indent}  `;
  const lines: string[] = [];
  let current = '';
  for (const word of words) {
    if (current !== '' && inner.length + current.length + word.length + 2 > lineWidth) {
      lines.push(`${current},`);
      current = word;
    } else current = current === '' ? word : `${current}, ${word}`;
  }
  lines.push(current);
  return `[\n${inner}${lines.join(`\n${inner}`)}\n${indent}]`;
}
