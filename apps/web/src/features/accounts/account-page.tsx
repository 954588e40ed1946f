import type { Account } from '@nightcone/contracts';
import { Page } from '../../components/page.tsx';
import { SheetRow } from '../../components/sheet.tsx';
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
      <SheetRow>
        <ProfileForm account={account} />
      </SheetRow>
      <SheetRow divided>
        <Tokens />
      </SheetRow>
      <SheetRow divided>
        <Sessions />
      </SheetRow>
    </Page>
  );
}
