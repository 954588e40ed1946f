import type { JobView } from '@nightcone/contracts';
import { Button, ButtonLink } from '../../components/button.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { useAction } from '../../lib/query.ts';
import { useSession } from '../../lib/session.ts';

/** Vary: New question filled with these inputs. Re-run: on the queue, the bits compared. */
export function JobActions({ job }: { job: JobView }) {
  const { account } = useSession();
  const rerun = useAction('rerunJob', { refreshes: ['getJob', 'listSubmissions', 'getNight', 'getQuota'] });
  const running = job.executions.some((execution) => execution.state === 'running');
  const finished = job.state === 'finished' || job.state === 'disputed';
  return (
    <>
      {finished ? (
        <Button
          busy={rerun.isPending}
          disabled={running}
          title={running ? 'An execution is running already' : 'Carried out again on the queue; the bits are compared'}
          onClick={() => rerun.mutate({ params: { hash: job.hash } })}
        >
          Re-run
        </Button>
      ) : null}
      {account?.role !== 'reviewer' ? (
        <ButtonLink to={`/question/${job.model}?from=${job.hash}`} look="main">
          Vary this question
        </ButtonLink>
      ) : null}
      {rerun.isError ? (
        <div className="w-full">
          <ProblemNote error={rerun.error} />
        </div>
      ) : null}
    </>
  );
}
