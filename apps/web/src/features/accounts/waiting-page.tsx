import type { Account } from '@nightcone/contracts';
import { Page } from '../../components/page.tsx';
import { useApi } from '../../lib/query.ts';
import { SignOutButton } from './sign-out-button.tsx';

/** Accounts that are not admitted have no event stream: this page alone asks again by itself. */
const askAgainMs = 10_000;

/** The one page that an account sees until an admin admits it, or after it was deactivated. */
export function WaitingPage({ account }: { account: Account }) {
  const waiting = account.state === 'waiting';
  useApi('getSession', undefined, { refetchInterval: waiting ? askAgainMs : false });
  return (
    <Page wide title={waiting ? 'Waiting to be admitted' : 'This account is deactivated'}>
      <div className="my-4 flex max-w-[62ch] flex-col gap-3">
        <p>
          You are signed in as <strong className="font-semibold">{account.name}</strong> (<code>{account.login}</code>).
        </p>
        <p className="text-ink2">
          {waiting
            ? 'An admin of the group has to admit you before you can see or submit work. This page changes by itself as soon as that has happened; there is nothing else to do.'
            : 'An admin of the group has deactivated it. Its jobs and results are kept and stay reproducible by their hashes. Ask an admin if this is a mistake.'}
        </p>
        <p>
          <SignOutButton />
        </p>
      </div>
    </Page>
  );
}
