/** One thing that is wrong: where it stands, what was found there and what would be allowed. */
export interface Problem {
  /** Field path as a developer writes it: `source.partials[3].amplitude`. */
  readonly path: string;
  /** The value found, shortened for reading: `17`, `"square"`, `a list of 5000`. */
  readonly value: string;
  /** What is allowed there, in words: `a whole number from 1 to 16`. */
  readonly allowed: string;
}

/** Says one problem on one line: `table.bits: 17 is not allowed; allowed: a whole number from 1 to 16`. */
export function sayProblem(problem: Problem): string {
  return `${problem.path}: ${problem.value} is not allowed; allowed: ${problem.allowed}`;
}

/** Input that the engine does not take. Nothing has been computed or changed when it is thrown. */
export class Refusal extends Error {
  override readonly name = 'Refusal';
  readonly problems: readonly [Problem, ...Problem[]];

  constructor(first: Problem, ...others: Problem[]) {
    super([first, ...others].map(sayProblem).join('\n'));
    this.problems = [first, ...others];
  }
}

const longestShown = 60;

/** Shows any value in a few words, whatever its size, so that a message stays one readable line. */
export function showValue(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (typeof value === 'string') {
    const whole = JSON.stringify(value.length > longestShown ? `${value.slice(0, longestShown)}…` : value);
    return whole;
  }
  if (typeof value === 'object' && value !== null) {
    const keys = Object.keys(value);
    const shown = keys.slice(0, 4).map((key) => (key.length > 24 ? `${key.slice(0, 24)}…` : key));
    return `an object with ${keys.length === 0 ? 'no fields' : shown.join(', ')}${keys.length > 4 ? ', …' : ''}`;
  }
  return String(value);
}

/** Joins path steps: `['source', 'partials', 3]` → `source.partials[3]`; the whole input is `definition`. */
export function showPath(steps: readonly PropertyKey[], whole = 'definition'): string {
  if (steps.length === 0) return whole;
  return steps.reduce<string>((path, step) => {
    if (typeof step === 'number') return `${path}[${step}]`;
    const name = String(step);
    const shown = name.length > longestShown ? `${name.slice(0, longestShown)}…` : name;
    if (!/^[A-Za-z_][\w-]*…?$/.test(shown)) return `${path}[${JSON.stringify(shown)}]`;
    return path === '' ? shown : `${path}.${shown}`;
  }, '');
}
