import type { Token } from '@nightcone/contracts';
import { useState } from 'react';
import { Button } from '../../components/button.tsx';
import { Clock } from '../../components/clock.tsx';
import { ConfirmButton } from '../../components/confirm-button.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { useAction, useApi } from '../../lib/query.ts';
import { NewTokenDialog } from './new-token-dialog.tsx';

/** Personal access tokens for scripts and the command line. */
export function Tokens() {
  const query = useApi('listTokens');
  const [open, setOpen] = useState(false);
  return (
    <section aria-labelledby="tokens">
      <div className="flex flex-wrap items-baseline justify-between gap-4">
        <div>
          <h2 id="tokens">Access tokens</h2>
          <p className="text-ink2 text-small">
            For scripts and the command line. A token can do what its scopes say, as you.
          </p>
        </div>
        <Button onClick={() => setOpen(true)}>Create a token</Button>
      </div>
      <QueryView query={query} what="your tokens">
        {({ rows }) =>
          rows.length === 0 ? (
            <p className="py-3 text-ink2">No tokens.</p>
          ) : (
            <ul className="mt-3 border-hair border-t">
              {rows.map((token) => (
                <TokenRow key={token.id} token={token} />
              ))}
            </ul>
          )
        }
      </QueryView>
      <NewTokenDialog open={open} onOpenChange={setOpen} />
    </section>
  );
}

function TokenRow({ token }: { token: Token }) {
  const revoke = useAction('revokeToken', { refreshes: ['listTokens'] });
  const expired = token.expiresAt !== null && Date.parse(token.expiresAt) < Date.now();
  return (
    <li className="border-hair border-b py-2 text-small">
      <div className="grid items-baseline gap-x-6 gap-y-0.5 sm:grid-cols-[minmax(9rem,1.2fr)_1fr_1.2fr_1.2fr_auto]">
        <span className="font-semibold">{token.name}</span>
        <span>{token.scopes.join(', ')}</span>
        <span className="text-ink2">
          {expired ? 'expired ' : token.expiresAt ? 'until ' : 'does not expire'}
          {token.expiresAt ? <Clock at={token.expiresAt} /> : null}
        </span>
        <span className="text-ink2">
          {token.lastUsedAt ? (
            <>
              last used <Clock at={token.lastUsedAt} />
            </>
          ) : (
            'never used'
          )}
        </span>
        <ConfirmButton
          label="Revoke"
          what={token.name}
          busy={revoke.isPending}
          onConfirm={() => revoke.mutate({ params: { id: token.id } })}
        />
      </div>
      {revoke.isError ? <ProblemNote error={revoke.error} /> : null}
    </li>
  );
}
