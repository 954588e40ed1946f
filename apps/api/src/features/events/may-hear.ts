import type { ChangeEvent } from '@nightcone/contracts';
import { type Db, findSubmissionOwner } from '@nightcone/db';
import type { Caller } from '../../context.ts';

/**
 * What this account may hear of a change. One's own submission is told with its sweep; anybody's moves the queue; a
 * quota is its owner's. Job hashes say nothing beyond themselves, and whoever may not open one gets nothing by asking.
 */
export async function mayHear(
  db: Db,
  { account }: Caller,
  kind: ChangeEvent['kind'],
  id: string,
): Promise<ChangeEvent[]> {
  if (kind === 'quota') return id === account.id ? [{ kind, id }] : [];
  if (kind !== 'submission') return [{ kind, id }];
  const owner = await findSubmissionOwner(db, id);
  if (owner === undefined) return [];
  const queue: ChangeEvent = { kind: 'queue', id: 'changed' };
  if (owner.accountId !== account.id) return [queue];
  return [{ kind, id }, ...(owner.sweepId ? [{ kind: 'sweep' as const, id: owner.sweepId }] : []), queue];
}
