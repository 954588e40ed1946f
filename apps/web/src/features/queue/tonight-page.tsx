import { lazy, Suspense } from 'react';
import { ButtonLink } from '../../components/button.tsx';
import { NightStrip } from '../../components/night-strip.tsx';
import { Page } from '../../components/page.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { MarginEntry, SheetRow } from '../../components/sheet.tsx';
import { useNight } from '../../components/use-night.ts';
import { formatDate } from '../../lib/format-time.ts';
import { useApi } from '../../lib/query.ts';
import { useSession } from '../../lib/session.ts';
import { headline } from './headline.ts';
import { LastNightMargin, LastNightSheet } from './last-night.tsx';
import { OpenWork } from './open-work.tsx';
import { QuotaLevel } from './quota-level.tsx';
import { RecentWork, recentlyEnded } from './recent-work.tsx';

const FirstQuestions = lazy(() => import('./first-questions.tsx'));

/** The evening and the morning page: what runs, what waits, what the night left. */
export function Component() {
  const { group, account } = useSession();
  const { night, now } = useNight();
  const work = useApi('listSubmissions', { query: {} });
  const ended = useApi('listSubmissions', { query: { open: 'false' } });
  const quota = useApi('getQuota');
  const lastNight = useApi('getLastNight');
  const zone = group.timeZone;
  const mayAsk = account?.role !== 'reviewer';
  const recent = recentlyEnded(ended.data?.rows ?? [], lastNight.data?.rows ?? [], now);
  const newcomer =
    mayAsk &&
    work.data?.rows.every((row) => !row.mine) === true &&
    ended.data?.rows.length === 0 &&
    lastNight.data?.rows.length === 0;
  const quotaEntry = (
    <MarginEntry level="major" title="This week’s quota">
      <p className="mb-2 text-ink3 text-small">resets Monday 00:00</p>
      <QueryView query={quota} what="the quota">
        {(data) => <QuotaLevel quota={data} now={now} />}
      </QueryView>
    </MarginEntry>
  );
  return (
    <Page
      wide
      title="Tonight"
      kicker={night ? `${formatDate(night.from, zone)} to ${formatDate(night.to, zone)}` : 'Tonight'}
      heading={
        <span className="text-[1.875rem] leading-9" aria-live="polite">
          {work.data ? headline(work.data.rows, night, lastNight.data, zone) : 'Tonight'}
        </span>
      }
      actions={
        mayAsk ? (
          <ButtonLink to="/question" look="main" className="min-w-38 max-sm:w-full">
            New question
          </ButtonLink>
        ) : null
      }
    >
      <NightStrip />
      {newcomer ? (
        <SheetRow margin={quotaEntry}>
          <Suspense>
            <FirstQuestions />
          </Suspense>
        </SheetRow>
      ) : null}
      <SheetRow divided={newcomer} margin={newcomer ? null : quotaEntry}>
        <section aria-labelledby="open-work">
          <h2 id="open-work" className="mb-1.5">
            Running and waiting
          </h2>
          <QueryView query={work} what="the queue">
            {(data) => <OpenWork rows={data.rows} />}
          </QueryView>
          {recent.length > 0 ? <RecentWork rows={recent} /> : null}
        </section>
      </SheetRow>
      <SheetRow divided margin={lastNight.data ? <LastNightMargin report={lastNight.data} /> : null}>
        <QueryView query={lastNight} what="last night’s report">
          {(data) => <LastNightSheet report={data} />}
        </QueryView>
      </SheetRow>
    </Page>
  );
}
