import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '../../components/button.tsx';
import { Clock } from '../../components/clock.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { useAction, useApi } from '../../lib/query.ts';
import { browserWords } from './browser-words.ts';
import { leave } from './sign-out-button.tsx';

/** Where this account is signed in, and the way to end it everywhere. */
export function Sessions() {
  const query = useApi('listSessions');
  const client = useQueryClient();
  const [asking, setAsking] = useState(false);
  const endAll = useAction('endAllSessions', { onSuccess: () => leave(client) });
  return (
    <section aria-labelledby="sessions">
      <div className="flex flex-wrap items-baseline justify-between gap-4">
        <h2 id="sessions">Signed in</h2>
        <Button onClick={() => setAsking(true)}>Sign out everywhere</Button>
      </div>
      <QueryView query={query} what="your sessions">
        {({ rows }) => (
          <ul className="mt-3 border-hair border-t">
            {rows.map((session) => (
              <li
                key={session.id}
                className="grid gap-x-6 gap-y-0.5 border-hair border-b py-2 text-small sm:grid-cols-[1.5fr_1fr_1fr]"
              >
                <span className={session.current ? 'font-semibold' : ''} title={session.agent}>
                  {browserWords(session.agent)}
                  {session.current ? ', this one' : ''}
                </span>
                <span className="text-ink2">
                  since <Clock at={session.createdAt} />
                </span>
                <span className="text-ink2">
                  last seen <Clock at={session.seenAt} />
                </span>
              </li>
            ))}
          </ul>
        )}
      </QueryView>
      <Dialog
        open={asking}
        onOpenChange={setAsking}
        title="Sign out everywhere?"
        description="Every browser is signed out, this one too. Access tokens stay valid; jobs go on."
      >
        {endAll.isError ? <ProblemNote error={endAll.error} /> : null}
        <div className="flex flex-wrap gap-3">
          <Button busy={endAll.isPending} onClick={() => endAll.mutate({})}>
            Sign out everywhere
          </Button>
          <Button onClick={() => setAsking(false)}>Stay signed in</Button>
        </div>
      </Dialog>
    </section>
  );
}
