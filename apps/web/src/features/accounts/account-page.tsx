import type { Account } from '@nightcone/contracts';
import { Page } from '../../components/page.tsx';
import { useSession } from '../../lib/session.ts';
import { ProfileForm } from './profile-form.tsx';
import { Sessions } from './sessions.tsx';
import { SignOutButton } from './sign-out-button.tsx';
import { Tokens } from './tokens.tsx';

export function Component() {
  const { account } = useSession();
  if (!account) return null;
  return <AccountSheet account={account} />;
}

function AccountSheet({ account }: { account: Account }) {
  return (
    <Page
      wide
      title="Your account"
      lead={
        <>
          <span>{account.name}</span>
          <code>{account.login}</code>
          <span>{account.role}</span>
        </>
      }
      actions={<SignOutButton />}
    >
      <div className="mt-5 flex max-w-[1008px] flex-col gap-10">
        <ProfileForm account={account} />
        <Tokens />
        <Sessions />
      </div>
    </Page>
  );
}
