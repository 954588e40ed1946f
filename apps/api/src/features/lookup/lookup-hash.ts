import type { endpoints } from '@nightcone/contracts';
import { type HashHit, listHashHits } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { jobTitle } from '../../job-title.ts';

export const lookupHash: Handler<typeof endpoints.lookupHash> = async ({ ctx, input }) => {
  const hits = await listHashHits(ctx.services.db, input.params.hash, ctx.caller.account.id);
  return { hits: hits.map((hit) => ({ kind: hit.kind, hash: hit.hash, title: titleOf(hit), path: pathOf(hit) })) };
};

function titleOf({ kind, name, specification }: HashHit): string {
  if (kind === 'kernel') return `Program ${name}`;
  if (kind === 'table') return `Table ${name}`;
  const title = jobTitle(specification);
  return kind === 'job' ? title : `Result of ${title}`;
}

/** Page of the web application: a result is read on the page of its job. */
const pathOf = ({ kind, hash, jobHash }: HashHit): string =>
  ({ job: `/jobs/${hash}`, result: `/jobs/${jobHash}`, kernel: '/methods', table: `/tables/${hash}` })[kind];
