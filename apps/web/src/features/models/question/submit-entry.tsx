import type { SweepInput } from '@nightcone/contracts';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button } from '../../../components/button.tsx';
import { ProblemNote } from '../../../components/problem-note.tsx';
import { api } from '../../../lib/api.ts';
import type { ApiProblem } from '../../../lib/api-problem.ts';
import { useSession } from '../../../lib/session.ts';
import { dropDraft } from './use-draft.ts';

type When = 'now' | 'tonight';

/** One question has one key, so that a second click or a lost answer never submits it twice. */
function useStableKey(): (text: string) => string {
  const kept = useRef({ text: '', key: '' });
  return (text) => {
    if (kept.current.text !== text)
      kept.current = {
        text,
        key: Array.from(crypto.getRandomValues(new Uint8Array(16)), (byte) => byte.toString(16).padStart(2, '0')).join(
          '',
        ),
      };
    return kept.current.key;
  };
}

/** The two ways to submit, and what the server said. */
export function SubmitEntry({
  input,
  refused,
  draftText,
}: {
  input: SweepInput | null;
  refused: string | null;
  draftText: string;
}) {
  const navigate = useNavigate();
  const client = useQueryClient();
  const { account } = useSession();
  const keyOf = useStableKey();
  const submit = useMutation<string, ApiProblem, When>({
    mutationFn: async (when) => {
      if (!input) throw new Error('nothing to submit');
      const body = { ...input, when };
      const options = { idempotencyKey: keyOf(JSON.stringify(body)) };
      if (input.axes && input.axes.length > 0) {
        const { sweepId } = await api.call('submitSweep', { body }, options);
        return `/sweeps/${sweepId}`;
      }
      const { title, specification } = input;
      const { hash } = await api.call('submitJob', { body: { title, specification, when } }, options);
      return `/jobs/${hash}`;
    },
    onSuccess: async (path) => {
      await dropDraft(input?.specification.model ?? '');
      void client.invalidateQueries({ queryKey: ['listSubmissions'] });
      void client.invalidateQueries({ queryKey: ['getQuota'] });
      void navigate(path);
    },
  });
  const mayNot = account?.role === 'reviewer' ? 'A reviewer asks through a review; this account cannot submit.' : null;
  const reason = mayNot ?? refused;
  const off = input === null || reason !== null || submit.isPending;
  return (
    <div>
      <div className="flex flex-wrap gap-3">
        <Button
          look="main"
          className="flex-auto"
          disabled={off}
          busy={submit.isPending}
          onClick={() => submit.mutate('tonight')}
        >
          Submit tonight
        </Button>
        <Button className="flex-auto" disabled={off} onClick={() => submit.mutate('now')}>
          Submit now
        </Button>
      </div>
      <p role="status" className="mt-2 min-h-5 text-ink2 text-small">
        {reason ?? (submit.isPending ? 'Submitting …' : draftText)}
      </p>
      {submit.isError ? <ProblemNote error={submit.error} /> : null}
    </div>
  );
}
