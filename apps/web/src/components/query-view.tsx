import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { ApiProblem } from '../lib/api-problem.ts';
import { Loading, ProblemNote } from './problem-note.tsx';

/** Loading, error and data of one query. Data already on screen stay there while a newer answer fails. */
export function QueryView<T>({
  query,
  what,
  children,
}: {
  query: UseQueryResult<T, ApiProblem>;
  /** Completes 'Reading …'. */
  what: string;
  children: (data: NonNullable<T>) => ReactNode;
}) {
  if (query.data !== undefined && query.data !== null) return <>{children(query.data)}</>;
  if (query.isError) return <ProblemNote error={query.error} retry={() => void query.refetch()} />;
  return <Loading what={what} />;
}
