import type { JobView } from '@nightcone/contracts';
import { Note } from '../../components/problem-note.tsx';
import { ProgressRuler, progressWords } from '../../components/progress-ruler.tsx';
import { SheetRow } from '../../components/sheet.tsx';
import { formatCpu } from '../../lib/format-time.ts';
import { FinishedRow } from './finished-row.tsx';

/** The plot with its read-out; before there is a result, how far it is; after a failure, why. */
export function ResultRow({ job }: { job: JobView }) {
  return (
    <>
      <h2 className="sr-only">Result</h2>
      {job.failure ? (
        <FailedRow job={job} failure={job.failure} />
      ) : job.resultDigest ? (
        <FinishedRow job={job} />
      ) : (
        <WaitingRow job={job} />
      )}
    </>
  );
}

function FailedRow({ job, failure }: { job: JobView; failure: NonNullable<JobView['failure']> }) {
  return (
    <SheetRow>
      <Note title="The program could not finish this question">
        <p>{failure.text}</p>
        <p>
          The same inputs fail the same way, so it is not tried again and its CPU time is counted. Vary the question:
          the inputs are kept. Reason <code>{failure.code}</code>, {formatCpu(job.cpuMs ?? 0)} used.
        </p>
      </Note>
    </SheetRow>
  );
}

function WaitingRow({ job }: { job: JobView }) {
  const execution = job.executions.find(({ state }) => state === 'running');
  const progress = execution?.progress ?? { done: 0, running: 0, failed: 0, total: job.estimate.slices };
  return (
    <SheetRow>
      <div className="max-w-160 py-6">
        <p role="status" className="mb-2 text-ink2">
          {execution ? progressWords(progress, 'slices') : 'Waiting for its turn.'} Estimated at{' '}
          {formatCpu(job.estimate.cpuMs)}.
        </p>
        <ProgressRuler progress={progress} unit="slices" />
      </div>
    </SheetRow>
  );
}
