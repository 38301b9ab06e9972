import { STATUS_CODES } from 'node:http';
import type { Problem as Fault } from '../../shared/contract/index.ts';

/** Every kind of problem the server answers with: its status and its title. The key ends its `type` URI for good. */
export const problemKinds = {
  'malformed-request': { status: 400, title: 'The request cannot be read' },
  unauthorized: { status: 401, title: 'Sign in first' },
  forbidden: { status: 403, title: 'Not allowed' },
  'two-person-rule': { status: 403, title: 'Somebody else has to do this' },
  'foreign-origin': { status: 403, title: 'The request comes from another site' },
  'not-found': { status: 404, title: 'Not found' },
  'method-not-allowed': { status: 405, title: 'This address does not take that method' },
  conflict: { status: 409, title: 'This is taken or in use' },
  'link-expired': { status: 410, title: 'This link has run out' },
  'link-used': { status: 410, title: 'This link has been used already' },
  'precondition-failed': { status: 412, title: 'Somebody else was faster' },
  unchanged: { status: 412, title: 'You have this already' },
  'too-large': { status: 413, title: 'The request is too large' },
  'unsupported-media-type': { status: 415, title: 'The content is of a type not taken here' },
  'wrong-host': { status: 421, title: 'This server answers to another name' },
  validation: { status: 422, title: 'Some values are not allowed' },
  'too-much-work': { status: 422, title: 'This takes more time or memory than one request may' },
  'precondition-required': { status: 428, title: 'Say which state you change' },
  'too-many-requests': { status: 429, title: 'Too many requests' },
  internal: { status: 500, title: 'Something went wrong here' },
  unavailable: { status: 503, title: 'Not available just now' },
} as const;

export type ProblemKind = keyof typeof problemKinds;

export interface ProblemOptions {
  /** What is the matter this time, in a sentence a person can act on. */
  readonly detail?: string;
  /** The fields at fault: path, value found, what is allowed. */
  readonly errors?: readonly Fault[];
  readonly headers?: Readonly<Record<string, string>>;
  /** Further members of the answer (RFC 9457 §3.2). */
  readonly extensions?: Readonly<Record<string, unknown>>;
  readonly cause?: unknown;
}

/** A problem to answer the client with, as RFC 9457 has it; throw it anywhere below a route. */
export class Problem extends Error {
  override readonly name = 'Problem';
  readonly kind: ProblemKind;
  readonly status: number;
  readonly headers: Readonly<Record<string, string>>;
  readonly errors: readonly Fault[] | undefined;
  readonly extensions: Readonly<Record<string, unknown>>;
  private readonly detail: string | undefined;

  constructor(
    kind: ProblemKind,
    { detail, errors, headers = {}, extensions = {}, cause }: ProblemOptions = {},
  ) {
    super(detail ?? problemKinds[kind].title, { cause });
    this.kind = kind;
    this.status = problemKinds[kind].status;
    this.detail = detail;
    this.errors = errors;
    this.headers = headers;
    this.extensions = extensions;
  }

  toJSON() {
    return {
      ...this.extensions,
      type: `/problems/${this.kind}`,
      title: problemKinds[this.kind].title,
      status: this.status,
      detail: this.detail,
      errors: this.errors,
    };
  }
}

/** A status that no kind above stands for: RFC 9457 §4.2.1 has `about:blank` say just what HTTP says. */
export const plainProblem = (status: number) => ({
  type: 'about:blank',
  title: STATUS_CODES[status] ?? 'Error',
  status,
});
