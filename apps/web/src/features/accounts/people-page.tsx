import { type Account, accountStates, roles } from '@nightcone/contracts';
import { AdminPage } from '../../components/admin-page.tsx';
import { TextButton } from '../../components/button.tsx';
import { Clock } from '../../components/clock.tsx';
import { ConfirmButton } from '../../components/confirm-button.tsx';
import { SelectField } from '../../components/field.tsx';
import { Pager } from '../../components/pager.tsx';
import { Empty, ProblemNote } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { StateMark, stateWord } from '../../components/state-mark.tsx';
import type { InputOf } from '../../lib/api.ts';
import { useAction, useApi } from '../../lib/query.ts';
import { useSession } from '../../lib/session.ts';
import { useUrlState } from '../../lib/url-state.ts';

/** Admit, deactivate, change roles. Every change is in the audit log. */
export function Component() {
  return (
    <AdminPage title="People" lead="Every change here is written to the audit log.">
      <People />
    </AdminPage>
  );
}

function People() {
  const [url, change] = useUrlState<'state' | 'cursor'>();
  const query = useApi('listAccounts', { query: url } as InputOf<'listAccounts'>);
  return (
    <>
      <div className="mt-4 mb-3 w-48">
        <SelectField label="State" value={url.state ?? ''} onChange={(event) => change({ state: event.target.value })}>
          <option value="">all states</option>
          {accountStates.map((state) => (
            <option key={state} value={state}>
              {stateWord(state)}
            </option>
          ))}
        </SelectField>
      </div>
      <QueryView query={query} what="the people">
        {(page) =>
          page.rows.length === 0 ? (
            <Empty title={url.state ? 'Nobody is in this state' : 'Nobody here'} />
          ) : (
            <>
              <ul className="border-hair border-t">
                {page.rows.map((account) => (
                  <PersonRow key={account.id} account={account} />
                ))}
              </ul>
              <Pager
                shown={page.rows.length}
                total={page.total}
                word="person"
                many="people"
                first={!url.cursor}
                next={page.nextCursor}
                go={(cursor) => change({ cursor })}
              />
            </>
          )
        }
      </QueryView>
    </>
  );
}

function PersonRow({ account }: { account: Account }) {
  const { account: me } = useSession();
  const save = useAction('changeAccount', { refreshes: ['listAccounts'] });
  const params = { id: account.id };
  const self = me?.id === account.id;
  return (
    <li className="border-hair border-b py-2 text-small">
      <div className="grid items-center gap-x-6 gap-y-1 md:grid-cols-[minmax(10rem,1fr)_7rem_8rem_12rem_11rem]">
        <span className="min-w-0">
          <span className="font-semibold">{account.name}</span> <code className="text-ink2">{account.login}</code>
          {self ? <span className="text-ink3"> you</span> : null}
        </span>
        <StateMark state={account.state} />
        <select
          aria-label={`Role of ${account.name}`}
          value={account.role}
          disabled={self || save.isPending}
          onChange={(event) => save.mutate({ params, body: { role: event.target.value as Account['role'] } })}
          className="min-h-7 border-rule border-b bg-field px-1.5 disabled:border-hair"
        >
          {roles.map((role) => (
            <option key={role}>{role}</option>
          ))}
        </select>
        <span className="text-ink2">
          since <Clock at={account.createdAt} />
        </span>
        {self ? (
          <span />
        ) : account.state === 'active' ? (
          <ConfirmButton
            label="Deactivate"
            what={account.name}
            busy={save.isPending}
            onConfirm={() => save.mutate({ params, body: { state: 'deactivated' } })}
          />
        ) : (
          <TextButton
            className="justify-self-start font-semibold"
            disabled={save.isPending}
            onClick={() => save.mutate({ params, body: { state: 'active' } })}
            aria-label={`${account.state === 'waiting' ? 'Admit' : 'Activate'} ${account.name}`}
          >
            {account.state === 'waiting' ? 'Admit' : 'Activate'}
          </TextButton>
        )}
      </div>
      {save.isError ? <ProblemNote error={save.error} /> : null}
    </li>
  );
}
