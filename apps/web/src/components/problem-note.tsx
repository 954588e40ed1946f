import type { ReactNode } from 'react';
import type { ApiProblem } from '../lib/api-problem.ts';
import { Button } from './button.tsx';

/** A quiet block with what happened, what was kept and what to do. */
export function Note({
  title,
  children,
  actions,
  role,
}: {
  title: ReactNode;
  children?: ReactNode;
  actions?: ReactNode;
  role?: 'alert' | 'status';
}) {
  return (
    <div role={role} className="my-4 max-w-[68ch] border-ink border-l-2 py-1 pl-4">
      <p className="font-semibold font-serif text-h3">{title}</p>
      {children ? <div className="mt-1 text-ink2">{children}</div> : null}
      {actions ? <div className="mt-3 flex flex-wrap gap-3">{actions}</div> : null}
    </div>
  );
}

export const Empty = ({
  title,
  children,
  actions,
}: {
  title: ReactNode;
  children?: ReactNode;
  actions?: ReactNode;
}) => (
  <Note title={title} actions={actions}>
    {children}
  </Note>
);

/** Says that something is on its way; drawn only after a moment, so that quick answers do not flash. */
export function Loading({ what }: { what: string }) {
  return (
    <p role="status" className="my-4 animate-[appear_0s_250ms_both] text-ink3">
      Reading {what} …
    </p>
  );
}

const words: Record<string, { title: string; help?: string }> = {
  offline: {
    title: 'Not connected',
    help: 'What stands on the page is kept. It is read again when the server answers.',
  },
  forbidden: { title: 'Not open to this account', help: 'An admin of the group can change roles.' },
  'not-found': { title: 'Nothing here', help: 'It does not exist, or it is not open to you.' },
  'too-many-requests': { title: 'Too many requests', help: 'Wait a minute, then try again.' },
  unavailable: { title: 'The server is busy or restarting', help: 'Jobs go on meanwhile. Try again in a moment.' },
  internal: {
    title: 'The server made a mistake',
    help: 'Nothing was changed. The request’s number helps an admin to find it.',
  },
};

/** The designed form of every refusal: forbidden, missing, offline, wrong input, server fault. */
export function ProblemNote({ error, retry }: { error: ApiProblem; retry?: () => void }) {
  const { problem } = error;
  const { title = problem.title, help } = words[problem.code] ?? {};
  return (
    <Note title={title} role="alert" actions={retry ? <Button onClick={retry}>Try again</Button> : undefined}>
      {problem.code !== 'offline' && problem.detail ? <p>{problem.detail}</p> : null}
      {help ? <p>{help}</p> : null}
      {problem.errors?.length ? (
        <ul className="mt-2 list-none">
          {problem.errors.map((each) => (
            <li key={`${each.field} ${each.message}`}>
              {each.field ? <code>{each.field}</code> : null} {each.message}
              {each.limit ? ` (${each.limit})` : ''}
            </li>
          ))}
        </ul>
      ) : null}
      {problem.requestId ? (
        <p className="mt-1 text-least">
          Request <code>{problem.requestId}</code>
        </p>
      ) : null}
    </Note>
  );
}
