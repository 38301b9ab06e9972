import type { Problem as Fault } from '../../shared/contract/index.ts';

/** Any function of one input; the registry's own types are kept by `Jobs`. */
export type Job = (input: never) => unknown;
export type JobRegistry = Readonly<Record<string, Job>>;

export interface JobRequest {
  readonly name: string;
  readonly input: unknown;
}

/** What a worker says: first that it is ready, then one answer for each request. */
export type JobAnswer =
  | { readonly kind: 'ready' }
  | { readonly kind: 'done'; readonly result: unknown }
  | { readonly kind: 'refused'; readonly problems: readonly [Fault, ...Fault[]] }
  | {
      readonly kind: 'failed';
      readonly name: string;
      readonly message: string;
      readonly stack?: string | undefined;
    };
