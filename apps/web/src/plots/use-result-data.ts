import type { ArrayInfo } from '@nightcone/contracts';
import { useQueries } from '@tanstack/react-query';
import { useMemo } from 'react';
import { api } from '../lib/api.ts';
import type { ApiProblem } from '../lib/api-problem.ts';
import { keyOf } from '../lib/query.ts';
import { type Body, type DataArray, type ResultData, toDataArray } from './result-data.ts';
import type { View } from './view.ts';
import { arraysOf } from './views.ts';

/**
 * The arrays that a view needs, each asked for once: a result never changes, so its arrays never grow stale.
 * `data` is null until all are there.
 */
export function useResultData(
  digest: string | null,
  body: Body,
  arrays: readonly ArrayInfo[],
  view: View | undefined,
): { data: ResultData | null; problem: ApiProblem | null; retry: () => void } {
  const names = digest && view ? arraysOf(view, arrays) : [];
  const infos = names.flatMap((name) => arrays.find((array) => array.name === name) ?? []);
  const queries = useQueries({
    queries: infos.map((info) => {
      const input = { params: { digest: digest ?? '', name: info.name } };
      return {
        queryKey: keyOf('getResultArray', input),
        queryFn: async ({ signal }: { signal: AbortSignal }) =>
          toDataArray(info, await api.bytes('getResultArray', input, { signal })),
        staleTime: Number.POSITIVE_INFINITY,
      };
    }),
  });
  const loaded = queries.map((query) => query.data);
  const complete = infos.length > 0 && loaded.every(Boolean);
  const key = queries.map((query) => query.dataUpdatedAt).join(' ');
  // biome-ignore lint/correctness/useExhaustiveDependencies: `key` stands for the loaded arrays, whose list is new each time
  const data = useMemo<ResultData | null>(
    () => (complete ? { body, arrays: new Map((loaded as DataArray[]).map((array) => [array.name, array])) } : null),
    [complete, key, body],
  );
  const failed = queries.find((query) => query.isError);
  return {
    data,
    problem: (failed?.error as ApiProblem | undefined) ?? null,
    retry: () => {
      for (const query of queries) if (query.isError) void query.refetch();
    },
  };
}
