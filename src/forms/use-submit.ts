import { useCallback, useState } from 'react';
import type { z } from 'zod';
import { asProblem, type ProblemError } from '../api/problem-error.ts';
import { requireAllowed } from './require-allowed.ts';

export interface Submitting<Input> {
  readonly isBusy: boolean;
  /** What kept the last try from being done. */
  readonly fault: ProblemError | null;
  /** Does nothing while another try is under way. Never throws. */
  readonly submit: (input: Input) => Promise<void>;
  /** What is wrong at a path, to stand beside its field. */
  readonly at: (path: string) => string | undefined;
  readonly clear: () => void;
}

/**
 * Carries a form to where it goes: checks it by its schema, so that the commonest slips cost no request, sends it, and
 * keeps what was refused. What was typed stays with its owner.
 */
export function useSubmit<Input>(
  act: (input: Input) => Promise<unknown>,
  schema?: z.ZodType,
): Submitting<Input> {
  const [isBusy, setIsBusy] = useState(false);
  const [fault, setFault] = useState<ProblemError | null>(null);

  const submit = async (input: Input) => {
    if (isBusy) return;
    setIsBusy(true);
    setFault(null);
    try {
      if (schema) requireAllowed(schema, input);
      await act(input);
    } catch (error) {
      setFault(asProblem(error));
    } finally {
      setIsBusy(false);
    }
  };
  const at = (path: string) => {
    const problem = fault?.at(path);
    return problem && sayBeside(problem);
  };
  const clear = useCallback(() => setFault(null), []);
  return { isBusy, fault, submit, at, clear };
}

/** Says a problem where the field's name stands beside it; what was typed as a secret is not said. */
function sayBeside({ path, value, allowed }: { path: string; value: string; allowed: string }): string {
  const what = /password|token/i.test(path) ? 'This' : /^(""|nothing)$/.test(value) ? 'Nothing' : value;
  return `${what} is not allowed. Allowed: ${allowed}.`;
}
