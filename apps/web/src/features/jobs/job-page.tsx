import type { JobView } from '@nightcone/contracts';
import { Link, useParams } from 'react-router-dom';
import { Clock } from '../../components/clock.tsx';
import { HashMark } from '../../components/hash-comb.tsx';
import { Page } from '../../components/page.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { SheetRow } from '../../components/sheet.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { useApi } from '../../lib/query.ts';
import { CertificateEntry, ChecksEntry, ValidityEntry } from './certificate.tsx';
import { Downloads } from './downloads.tsx';
import { Executions } from './executions.tsx';
import { Inputs } from './inputs.tsx';
import { JobActions } from './job-actions.tsx';
import { jobStateWord } from './job-state.ts';
import { ResultRow } from './result-row.tsx';

/** One job: what was asked, what came out, how good it is, and whether it comes out again. */
export function Component() {
  const { hash = '' } = useParams();
  const query = useApi('getJob', { params: { hash } });
  if (!query.data) {
    return (
      <Page wide title="Job">
        <QueryView query={query} what="the job">
          {() => null}
        </QueryView>
      </Page>
    );
  }
  return <JobSheet job={query.data} />;
}

function JobSheet({ job }: { job: JobView }) {
  return (
    <Page
      title={job.title}
      lead={
        <>
          <StateMark state={jobStateWord(job)}>
            {jobStateWord(job)} {job.finishedAt ? <Clock at={job.finishedAt} /> : null}
          </StateMark>
          <code>{job.model}</code>
          <span>asked by {job.askedBy.label}</span>
          {job.sweeps.map((sweep) => (
            <Link key={sweep.id} to={`/sweeps/${sweep.id}`} className="link">
              {sweep.title}
            </Link>
          ))}
          <HashMark hash={job.hash} what="job hash" />
        </>
      }
      actions={<JobActions job={job} />}
    >
      <ResultRow job={job} />
      <SheetRow
        divided
        margin={
          <>
            {job.certificate ? (
              <>
                <CertificateEntry model={job.model} certificate={job.certificate} />
                <ChecksEntry model={job.model} certificate={job.certificate} />
              </>
            ) : null}
            <ValidityEntry model={job.model} notes={job.notes} />
          </>
        }
      >
        <div className="grid gap-x-10 gap-y-7 md:grid-cols-2 xl:grid-cols-[1.05fr_1.15fr_0.9fr]">
          <Inputs job={job} />
          <Executions executions={job.executions} />
          <Downloads job={job} />
        </div>
      </SheetRow>
    </Page>
  );
}
