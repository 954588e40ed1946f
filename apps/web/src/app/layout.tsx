import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Navigate, Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import { NightStripThin } from '../components/night-strip-thin.tsx';
import { Loading, ProblemNote } from '../components/problem-note.tsx';
import { WaitingPage } from '../features/accounts/waiting-page.tsx';
import { useLiveData } from '../lib/live-data.ts';
import { useSession } from '../lib/session.ts';
import { ConnectionNote } from './connection-note.tsx';
import { Footer } from './footer.tsx';
import { Header } from './header.tsx';

/** Pages that anybody may read. */
const open = (path: string) => path === '/sign-in' || path.startsWith('/methods');
/** Tonight and a sweep's page draw the night strip in full themselves. */
const drawsOwnStrip = (path: string) => path === '/' || /^\/sweeps\/./.test(path) || path === '/sign-in';

export function Layout() {
  const { query, account } = useSession();
  const { pathname, search } = useLocation();
  const active = account?.state === 'active';
  useLiveData(useQueryClient(), active);
  const main = useFocusOnArrival(pathname);
  const busy = useNavigation().state === 'loading';
  return (
    <div className="mx-auto flex min-h-dvh max-w-[1440px] flex-col px-4 margin:px-10">
      <a
        href="#content"
        className="absolute top-1 left-4 z-30 -translate-y-20 bg-ink px-3 py-1.5 text-ground focus-visible:translate-y-0"
      >
        Skip to the content
      </a>
      <Header account={active ? account : null} />
      <ConnectionNote />
      {active && !drawsOwnStrip(pathname) ? <NightStripThin /> : null}
      <main id="content" ref={main} tabIndex={-1} aria-busy={busy || undefined} className="grow outline-none">
        {content()}
      </main>
      <Footer />
      <ScrollRestoration />
    </div>
  );

  function content() {
    if (query.isPending) return <Loading what="who is signed in" />;
    if (query.isError) return <ProblemNote error={query.error} retry={() => void query.refetch()} />;
    if (open(pathname)) return <Outlet />;
    if (!account) return <Navigate to={`/sign-in?returnTo=${encodeURIComponent(pathname + search)}`} replace />;
    if (!active) return <WaitingPage account={account} />;
    return <Outlet />;
  }
}

/** After a change of page the keyboard starts at its content; not on the first load. */
function useFocusOnArrival(pathname: string) {
  const main = useRef<HTMLElement>(null);
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current === pathname) return;
    last.current = pathname;
    main.current?.focus({ preventScroll: true });
  }, [pathname]);
  return main;
}
