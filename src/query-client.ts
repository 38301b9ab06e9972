import { QueryClient } from '@tanstack/react-query';
import { ProblemError } from './api/problem-error.ts';

/** What the server has refused, it refuses again; only what did not get through is tried once more. */
const isWorthRetrying = (failures: number, error: Error): boolean =>
  failures < 1 && (!(error instanceof ProblemError) || error.isPassing);

export const createQueryClient = () =>
  new QueryClient({
    defaultOptions: {
      queries: { staleTime: 30_000, retry: isWorthRetrying, refetchOnWindowFocus: false },
    },
  });
