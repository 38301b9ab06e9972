import { refuseAt } from '../refuse.ts';

/** One operand of a directive, and where it stands. */
export interface Operand {
  readonly text: string;
  readonly at: number;
}

/** One statement of assembly source. */
export interface Statement {
  readonly labels: readonly Operand[];
  /** The directive or instruction in lower case, without a leading point; empty where there is a label alone. */
  readonly operation: string;
  readonly at: number;
  readonly operands: readonly Operand[];
}

const dataDirective =
  /^\s*(?:[A-Za-z_.$][\w.$]*:\s*)?\.?(?:byte|db|word|dw|short|hword|2byte|long|int|4byte)[ \t]+[$\d'-]/i;

/**
 * Statements of assembly source, one a line. Comments begin with `;`, `#`, `@`, `//` or stand between slashes and
 * stars. What follows a `;` and is a data directive is a comment to some assemblers and a statement to others: refused.
 */
export function* statementsOf(text: string): Generator<Statement> {
  let at = 0;
  while (at < text.length) {
    const line = clearedLine(text, at);
    const statement = statementIn(line.text, at);
    if (statement) yield statement;
    at = line.next;
  }
}

/** A line with blanks in place of its comments, and where the next one begins. */
function clearedLine(text: string, from: number): { text: string; next: number } {
  let cleared = '';
  let copied = from;
  let at = from;
  const clearTo = (end: number) => {
    cleared += text.slice(copied, at) + ' '.repeat(end - at);
    copied = end;
    at = end;
  };
  while (at < text.length) {
    const unit = text[at];
    if (unit === '\n' || unit === '\r') break;
    if (unit === '"') at = endOfString(text, at);
    else if (unit === "'") at = endOfCharacter(text, at);
    else if (unit === '/' && text[at + 1] === '*') {
      const close = text.indexOf('*/', at + 2);
      if (close < 0) refuseAt(text, at, '"/*" that is never closed', '"*/" after it');
      clearTo(close + 2);
    } else if (unit === ';' || unit === '#' || unit === '@' || (unit === '/' && text[at + 1] === '/')) {
      const end = endOfLine(text, at);
      if (unit === ';' && dataDirective.test(text.slice(at + 1, Math.min(end, at + 200)))) {
        refuseAt(
          text,
          at,
          'data behind ";", a comment to some assemblers and a statement to others,',
          'one statement a line, comments without directives',
        );
      }
      clearTo(end);
    } else at = nextSign(text, at + 1);
  }
  cleared += text.slice(copied, at);
  return { text: cleared, next: text.startsWith('\r\n', at) ? at + 2 : at + 1 };
}

/** Where the next character stands that may begin something, or end the line. */
function nextSign(text: string, from: number): number {
  signs.lastIndex = from;
  return signs.test(text) ? signs.lastIndex - 1 : text.length;
}

const signs = /["'/;#@\n\r]/g;

function endOfLine(text: string, from: number): number {
  let at = from;
  while (at < text.length && text[at] !== '\n' && text[at] !== '\r') at += 1;
  return at;
}

/** To the closing quote, or to the end of the line where there is none. */
function endOfString(text: string, from: number): number {
  let at = from + 1;
  while (at < text.length && text[at] !== '"' && text[at] !== '\n' && text[at] !== '\r') {
    at += text[at] === '\\' ? 2 : 1;
  }
  return text[at] === '"' ? at + 1 : Math.min(at, text.length);
}

/** `'a` or `'a'`, the character escaped or not. */
function endOfCharacter(text: string, from: number): number {
  const taken = /^'(?:\\[0-7]{1,3}|\\x[\da-fA-F]{1,2}|\\.|[^\\\r\n])?'?/.exec(text.slice(from, from + 8));
  return from + (taken?.[0].length ?? 1);
}

const labelBefore = /^\s*([A-Za-z_.$][\w.$]*|\d+)\s*:/;
const operationAt = /^\s*\.?([A-Za-z0-9_]+)/;
const bareLabel =
  /^\s*([A-Za-z_][\w.$]*)\s+(\.?(?:byte|db|word|dw|short|hword|2byte|long|int|4byte|equ|set)\b)/i;

function statementIn(line: string, lineStart: number): Statement | undefined {
  let rest = line;
  const labels: Operand[] = [];
  const place = () => lineStart + line.length - rest.length;
  for (let label = labelBefore.exec(rest); label; label = labelBefore.exec(rest)) {
    labels.push({ text: label[1], at: place() + label[0].indexOf(label[1]) });
    rest = rest.slice(label[0].length);
  }
  const bare = bareLabel.exec(rest);
  if (bare && !rest.trimStart().startsWith('.')) {
    labels.push({ text: bare[1], at: place() + bare[0].indexOf(bare[1]) });
    rest = rest.slice(bare[0].length - bare[2].length);
  }
  const operation = operationAt.exec(rest);
  if (!operation) {
    if (labels.length === 0 && rest.trim() === '') return undefined;
    return { labels, operation: rest.trim() === '' ? '' : '?', at: place(), operands: [] };
  }
  const at = place() + operation[0].search(/\S/);
  rest = rest.slice(operation[0].length);
  const assigned = /^\s*=(?!=)/.exec(rest);
  if (assigned) {
    labels.push({ text: operation[1], at });
    return {
      labels,
      operation: '=',
      at,
      operands: operandsIn(rest.slice(assigned[0].length), place() + assigned[0].length),
    };
  }
  return { labels, operation: operation[1].toLowerCase(), at, operands: operandsIn(rest, place()) };
}

function operandsIn(rest: string, restStart: number): Operand[] {
  if (rest.trim() === '') return [];
  const operands: Operand[] = [];
  let begin = 0;
  const take = (end: number) => {
    const piece = rest.slice(begin, end);
    const lead = piece.search(/\S|$/);
    operands.push({ text: piece.trim(), at: restStart + begin + lead });
    begin = end + 1;
  };
  const isPlain = !/["']/.test(rest);
  for (let at = 0; at < rest.length;) {
    if (isPlain) {
      const comma = rest.indexOf(',', at);
      if (comma < 0) break;
      take(comma);
      at = comma + 1;
    } else if (rest[at] === "'") at = endOfCharacter(rest, at);
    else if (rest[at] === '"') at = endOfString(rest, at);
    else {
      if (rest[at] === ',') take(at);
      at += 1;
    }
  }
  take(rest.length);
  return operands;
}
