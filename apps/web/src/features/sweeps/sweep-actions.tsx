import type { Sweep } from '@nightcone/contracts';
import { useState } from 'react';
import { Button, ButtonLink } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { plural } from '../../lib/format-quantity.ts';
import { useAction } from '../../lib/query.ts';
import { useSession } from '../../lib/session.ts';
import { sweepProgress } from './sweep-state.ts';

const refreshes = ['getSweep', 'listSweepPoints', 'listSubmissions', 'getNight', 'getQuota'] as const;

/** Pause, go on, cancel, put broken-off points back, vary. */
export function SweepActions({ sweep }: { sweep: Sweep }) {
  const { account } = useSession();
  const { state, id, mine } = sweep.submission;
  const pause = useAction('pauseSubmission', { refreshes });
  const resume = useAction('resumeSubmission', { refreshes });
  const cancel = useAction('cancelSubmission', { refreshes });
  const retry = useAction('retryFailed', { refreshes });
  const [asking, setAsking] = useState(false);
  const brokenOff = sweep.counts['broken-off'] ?? 0;
  const open = state === 'active' || state === 'paused';
  const failed = [pause, resume, cancel, retry].find((action) => action.isError);
  const left = sweep.points - sweepProgress(sweep).done;
  return (
    <>
      {mine && state === 'active' ? (
        <Button busy={pause.isPending} onClick={() => pause.mutate({ params: { id } })}>
          Pause
        </Button>
      ) : null}
      {mine && state === 'paused' ? (
        <Button busy={resume.isPending} onClick={() => resume.mutate({ params: { id } })}>
          Go on
        </Button>
      ) : null}
      {mine && open ? <Button onClick={() => setAsking(true)}>Cancel</Button> : null}
      {mine && brokenOff > 0 ? (
        <Button busy={retry.isPending} onClick={() => retry.mutate({ params: { id: sweep.id } })}>
          Put {plural(brokenOff, 'point')} back
        </Button>
      ) : null}
      {account?.role !== 'reviewer' ? (
        <ButtonLink to={`/question/${sweep.model}?sweep=${sweep.id}`} look="main">
          Vary this sweep
        </ButtonLink>
      ) : null}
      {failed?.error ? (
        <div className="w-full">
          <ProblemNote error={failed.error} />
        </div>
      ) : null}
      <Dialog
        open={asking}
        onOpenChange={setAsking}
        title="Cancel this sweep?"
        description={`Running slices stop within seconds and ${plural(left, 'point')} will not be computed. What is finished is kept, and the rest of the reservation returns to your quota.`}
      >
        <div className="flex flex-wrap gap-3">
          <Button
            busy={cancel.isPending}
            onClick={() => cancel.mutate({ params: { id } }, { onSuccess: () => setAsking(false) })}
          >
            Cancel the sweep
          </Button>
          <Button onClick={() => setAsking(false)}>Keep it going</Button>
        </div>
      </Dialog>
    </>
  );
}
