import type { SweepEstimate, SweepInput } from '@nightcone/contracts';
import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { api } from '../../../lib/api.ts';
import type { ApiProblem } from '../../../lib/api-problem.ts';

const restMs = 350;

/** The value once it has not changed for a while. */
export function useRested<T>(value: T, ms = restMs): T {
  const [rested, setRested] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setRested(value), ms);
    return () => clearTimeout(timer);
  }, [value, ms]);
  return rested;
}

export interface EstimateState {
  estimate: SweepEstimate | null;
  /** The estimate belongs to what is typed now. */
  current: boolean;
  problem: ApiProblem | null;
}

/** The server's dry run of the question, a moment after the last keystroke; an older request is abandoned. */
export function useEstimate(input: SweepInput | null): EstimateState {
  const text = input ? JSON.stringify(input) : null;
  const rested = useRested(text);
  const query = useQuery<SweepEstimate, ApiProblem>({
    queryKey: ['estimateSweep', rested],
    queryFn: ({ signal }) => api.call('estimateSweep', { body: JSON.parse(rested ?? '{}') as SweepInput }, { signal }),
    enabled: rested !== null,
    placeholderData: keepPreviousData,
    staleTime: 60_000,
    retry: false,
  });
  return {
    estimate: query.data ?? null,
    current: rested === text && rested !== null && !query.isPlaceholderData && query.isSuccess,
    problem: query.error,
  };
}
