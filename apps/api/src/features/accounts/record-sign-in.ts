import type { Account } from '@nightcone/contracts';
import { type Db, saveSignedInAccount } from '@nightcone/db';
import { accountView } from './account-view.ts';

export interface SignedInPerson {
  providerId: string;
  login: string;
  name: string;
  email: string | null;
}

/** The account of somebody whom the provider has just named; an unknown one waits. A deactivated one stays outside. */
export async function recordSignIn(db: Db, person: SignedInPerson, firstAdmin?: string): Promise<Account | undefined> {
  const account = await saveSignedInAccount(db, person, firstAdmin, null);
  return account.state === 'deactivated' ? undefined : accountView(account);
}
