import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { Button } from '../components/button.tsx';
import { Page } from '../components/page.tsx';
import { ProblemNote } from '../components/problem-note.tsx';
import { ApiProblem } from '../lib/api-problem.ts';

/** A page that broke: what happened, that nothing was lost, and two ways on. `bare`: without header and footer. */
export function RouteError({ bare = false }: { bare?: boolean }) {
  const error = useRouteError();
  // A chunk that no longer exists: the application was replaced while this tab was open.
  const outdated = error instanceof TypeError && /import|module/i.test(error.message);
  const text = isRouteErrorResponse(error) ? error.statusText : error instanceof Error ? error.message : String(error);
  const body =
    error instanceof ApiProblem ? (
      <ProblemNote error={error} retry={() => location.reload()} />
    ) : (
      <>
        <p className="my-4 max-w-[60ch] text-ink2">
          {outdated
            ? 'The connection is down, or a newer Nightcone was installed meanwhile. Nothing was lost; load it again.'
            : 'The page made a mistake and was stopped. Jobs on the queue go on, and drafts are kept.'}
        </p>
        {outdated ? null : (
          <p className="my-4">
            <code>{text}</code>
          </p>
        )}
        <div className="flex gap-3">
          <Button look="main" onClick={() => location.reload()}>
            Load again
          </Button>
          <Button onClick={() => location.assign('/')}>To Tonight</Button>
        </div>
      </>
    );
  const page = (
    <Page wide title={outdated ? 'This page could not be fetched' : 'This page stopped'}>
      {body}
    </Page>
  );
  return bare ? <main className="mx-auto max-w-[1440px] px-4 py-10 margin:px-10">{page}</main> : page;
}
