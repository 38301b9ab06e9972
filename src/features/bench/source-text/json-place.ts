import type { SyntaxNode, Tree } from '@lezer/common';

/** From and to of a part of a text, in UTF-16 code units. */
export interface TextRange {
  readonly from: number;
  readonly to: number;
}

const valueNames = new Set(['Object', 'Array', 'String', 'Number', 'True', 'False', 'Null']);

/**
 * Where the field at a path (`source.partials[3].amplitude`) stands in a JSON text, by the text's syntax tree. A field
 * that is not there gives the innermost thing on the way that is, by its opening; one that should not be there, its
 * name.
 */
export function placeOfPath(tree: Tree, text: string, path: string): TextRange {
  let here: SyntaxNode | null = tree.topNode.firstChild;
  if (here === null) return { from: 0, to: text.length };
  for (const step of stepsOf(path)) {
    const next: SyntaxNode | null = typeof step === 'number' ? itemAt(here, step) : fieldOf(here, step, text);
    if (next === null) return openingOf(here);
    here = next;
  }
  return here.name === 'Object' || here.name === 'Array' ? openingOf(here) : rangeOf(here);
}

/** A whole object underlined would hide what in it is meant: its name, or its opening bracket. */
function openingOf(node: SyntaxNode): TextRange {
  const name = node.parent?.name === 'Property' ? node.parent.firstChild : null;
  return name === null ? { from: node.from, to: node.from + 1 } : rangeOf(name);
}

const rangeOf = ({ from, to }: SyntaxNode): TextRange => ({ from, to });

function* childrenOf(node: SyntaxNode): Generator<SyntaxNode> {
  for (let child = node.firstChild; child !== null; child = child.nextSibling) yield child;
}

function itemAt(node: SyntaxNode, index: number): SyntaxNode | null {
  if (node.name !== 'Array') return null;
  let count = 0;
  for (const child of childrenOf(node)) {
    if (!valueNames.has(child.name)) continue;
    if (count === index) return child;
    count += 1;
  }
  return null;
}

/** The last field of a name, as JSON.parse takes it. */
function fieldOf(node: SyntaxNode, name: string, text: string): SyntaxNode | null {
  if (node.name !== 'Object') return null;
  let found: SyntaxNode | null = null;
  for (const property of childrenOf(node)) {
    const key = property.name === 'Property' ? property.firstChild : null;
    if (key === null || nameIn(text.slice(key.from, key.to)) !== name) continue;
    found = property.lastChild;
  }
  return found;
}

function nameIn(quoted: string): string | null {
  try {
    return String(JSON.parse(quoted));
  } catch {
    return null;
  }
}

/** Steps of a path as refusals write it: names behind points, indices and quoted names in brackets. */
export function stepsOf(path: string): (string | number)[] {
  if (path === 'definition') return [];
  const steps: (string | number)[] = [];
  for (const [, name, index, quoted] of path.matchAll(/([\w-]+)|\[(\d+)\]|\[("(?:[^"\\]|\\.)*")\]/g)) {
    if (name !== undefined) steps.push(name);
    else if (index !== undefined) steps.push(Number(index));
    else steps.push(nameIn(quoted) ?? quoted);
  }
  return steps;
}
