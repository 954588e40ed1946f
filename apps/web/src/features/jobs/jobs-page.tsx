import { keepPreviousData } from '@tanstack/react-query';
import { ButtonLink } from '../../components/button.tsx';
import { DataTable } from '../../components/data-table.tsx';
import { Page } from '../../components/page.tsx';
import { Pager } from '../../components/pager.tsx';
import { Empty } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import type { InputOf } from '../../lib/api.ts';
import { useApi } from '../../lib/query.ts';
import { useUrlState } from '../../lib/url-state.ts';
import { jobColumns } from './jobs-columns.tsx';
import { JobsFilters } from './jobs-filters.tsx';

type Names = 'model' | 'state' | 'mine' | 'text' | 'sort' | 'direction' | 'cursor';
const defaults = { sort: 'createdAt', direction: 'descending' } as const;

/** All jobs that this account may see; filters, order and page are in the address. */
export function Component() {
  const [url, change] = useUrlState<Names>();
  const sort = url.sort ?? defaults.sort;
  const direction = url.direction === 'ascending' ? 'ascending' : defaults.direction;
  const query = useApi('listJobs', { query: { ...url, sort, direction } } as InputOf<'listJobs'>, {
    placeholderData: keepPreviousData,
  });
  const filtered = Boolean(url.model || url.state || url.mine || url.text);
  return (
    <Page wide title="Jobs" lead="One job is one computation; the same inputs are the same job, whoever asks.">
      <div className="mt-5">
        <JobsFilters filters={url} change={change} />
        <QueryView query={query} what="the jobs">
          {(page) =>
            page.rows.length === 0 ? (
              filtered ? (
                <Empty title="No job fits these filters" actions={<ButtonLink to="/jobs">Show all jobs</ButtonLink>} />
              ) : (
                <Empty
                  title="No jobs yet"
                  actions={
                    <ButtonLink to="/question" look="main">
                      New question
                    </ButtonLink>
                  }
                >
                  What you or your colleagues submit stands here, with its hash and its result.
                </Empty>
              )
            ) : (
              <>
                <DataTable
                  caption="Jobs"
                  columns={jobColumns}
                  rows={page.rows}
                  rowId={(job) => job.hash}
                  sort={{ id: sort, direction }}
                  onSort={(next) => change({ sort: next.id, direction: next.direction })}
                  busy={query.isFetching}
                />
                <Pager
                  shown={page.rows.length}
                  total={page.total}
                  word="job"
                  first={!url.cursor}
                  next={page.nextCursor}
                  go={(cursor) => change({ cursor })}
                />
              </>
            )
          }
        </QueryView>
      </div>
    </Page>
  );
}
