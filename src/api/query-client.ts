import { QueryClient } from '@tanstack/react-query';
import { CallError } from './call-error.ts';

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: {
      staleTime: 10_000,
      // A refusal stays a refusal; only an answer that did not come is worth asking for again.
      retry: (count, error) => count < 2 && error instanceof CallError && error.problem === null,
    },
  },
});
