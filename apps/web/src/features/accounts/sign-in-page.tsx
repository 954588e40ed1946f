import { Navigate, useSearchParams } from 'react-router-dom';
import { Page } from '../../components/page.tsx';
import { Note } from '../../components/problem-note.tsx';
import { useSession } from '../../lib/session.ts';

/** Plain on purpose: what this is, and one way in. */
export function Component() {
  const { account, group } = useSession();
  const [search] = useSearchParams();
  const asked = search.get('returnTo') ?? '/';
  const returnTo = asked.startsWith('/') && !asked.startsWith('//') ? asked : '/';
  if (account) return <Navigate to={returnTo} replace />;
  return (
    <Page wide title="Sign in" heading="The group’s overnight queue">
      <div className="my-6 flex max-w-[62ch] flex-col gap-5">
        {search.has('failed') ? (
          <Note role="alert" title="The sign-in did not work">
            <p>
              The provider refused it or did not answer, or this account is deactivated here. Try again, or ask an
              admin.
            </p>
          </Note>
        ) : null}
        <p className="font-serif text-h3 text-ink2">
          Nightcone computes what a continuum Dirac Hamiltonian predicts when a magnetic field, an edge, a strain or a
          potential is added: swept over hundreds of points overnight, checked against closed forms, and kept under one
          hash, from which anybody gets the same bits again.
        </p>
        <p>
          <a
            href={`/auth/github?returnTo=${encodeURIComponent(returnTo)}`}
            className="inline-flex min-h-11 items-center rounded-button border border-amberm bg-amber px-6 font-semibold text-onamber hover:bg-amberm/85"
          >
            Sign in with GitHub
          </a>
        </p>
        <p className="text-ink2 text-small">
          {group.name}. A new account waits until an admin of the group admits it. Methods can be read without signing
          in.
        </p>
      </div>
    </Page>
  );
}
