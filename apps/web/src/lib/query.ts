import type { EndpointId } from '@nightcone/contracts';
import {
  QueryCache,
  QueryClient,
  type UseMutationOptions,
  type UseQueryOptions,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import { type AnswerOf, api, type InputOf } from './api.ts';
import { ApiProblem } from './api-problem.ts';

/**
 * Conventions: the key of a query is `[endpoint id, input]`, so the event stream can invalidate by endpoint and id.
 * Data stay fresh until an event says otherwise; nothing polls.
 */
export const keyOf = <Id extends EndpointId>(id: Id, input?: InputOf<Id>) => [id, input ?? {}] as const;

export function createQueryClient(): QueryClient {
  const client: QueryClient = new QueryClient({
    // A session that ended meanwhile: ask who is signed in, and the layout leads to the sign-in page.
    queryCache: new QueryCache({
      onError: (error, query) => {
        if (error instanceof ApiProblem && error.status === 401 && query.queryKey[0] !== 'getSession') {
          void client.invalidateQueries({ queryKey: ['getSession'] });
        }
      },
    }),
    defaultOptions: {
      // 'always': without a connection a request is tried and says so, it does not wait in silence.
      mutations: { networkMode: 'always' },
      queries: {
        networkMode: 'always',
        staleTime: 30_000,
        refetchOnWindowFocus: true,
        retry: (count, error) =>
          count < 2 && (!(error instanceof ApiProblem) || [0, 502, 503, 504].includes(error.status)),
      },
    },
  });
  return client;
}

type QueryExtras<Id extends EndpointId> = Omit<UseQueryOptions<AnswerOf<Id>, ApiProblem>, 'queryKey' | 'queryFn'>;

/** `useApi('getJob', { params: { hash } })`. */
export function useApi<Id extends EndpointId>(id: Id, input?: InputOf<Id>, extras: QueryExtras<Id> = {}) {
  return useQuery<AnswerOf<Id>, ApiProblem>({
    queryKey: keyOf(id, input),
    queryFn: ({ signal }) => (api.call as (...args: unknown[]) => Promise<AnswerOf<Id>>)(id, input, { signal }),
    ...extras,
  });
}

type ActionExtras<Id extends EndpointId> = Omit<
  UseMutationOptions<AnswerOf<Id>, ApiProblem, InputOf<Id>>,
  'mutationFn'
> & {
  /** Endpoints whose answers are asked for again afterwards. */
  refreshes?: readonly EndpointId[];
};

/** A write: `const pause = useAction('pauseSubmission', { refreshes: ['getSweep'] }); pause.mutate({ params: { id } })`. */
export function useAction<Id extends EndpointId>(
  id: Id,
  { refreshes = [], onSuccess, ...extras }: ActionExtras<Id> = {},
) {
  const client = useQueryClient();
  return useMutation<AnswerOf<Id>, ApiProblem, InputOf<Id>>({
    mutationFn: (input) => (api.call as (...args: unknown[]) => Promise<AnswerOf<Id>>)(id, input),
    ...extras,
    onSuccess: async (...args) => {
      await Promise.all(refreshes.map((name) => client.invalidateQueries({ queryKey: [name] })));
      await onSuccess?.(...args);
    },
  });
}
