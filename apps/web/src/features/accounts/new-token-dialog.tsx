import { type Scope, scopes } from '@nightcone/contracts';
import { type FormEvent, useState } from 'react';
import { Button } from '../../components/button.tsx';
import { CopyButton } from '../../components/copy-button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { SelectField, TextField } from '../../components/field.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { useAction } from '../../lib/query.ts';

const scopeWords: Record<Scope, string> = {
  read: 'see jobs, results, sweeps and the queue',
  submit: 'submit, re-run, pause and cancel',
  manage: 'change the account, and the group for admins',
};
const lives = [
  { days: '30', words: '30 days' },
  { days: '90', words: '90 days' },
  { days: '366', words: 'a year' },
  { days: '', words: 'does not expire' },
];

/** Name, scopes, life; then the text of the token, once. */
export function NewTokenDialog({ open, onOpenChange }: { open: boolean; onOpenChange: (open: boolean) => void }) {
  const create = useAction('createToken', { refreshes: ['listTokens'] });
  const close = (next: boolean) => {
    onOpenChange(next);
    if (!next) create.reset();
  };
  return (
    <Dialog open={open} onOpenChange={close} title={create.data ? 'Copy the token now' : 'Create a token'}>
      {create.data ? (
        <div className="flex flex-col gap-3">
          <p>
            This is the only time that its text is shown; only its hash is kept here. Give it to{' '}
            <code>{create.data.name}</code> and to nothing else.
          </p>
          <pre className="whitespace-pre-wrap break-all bg-field p-3">{create.data.text}</pre>
          <div className="flex items-center gap-5">
            <CopyButton text={create.data.text}>Copy the token</CopyButton>
            <Button onClick={() => close(false)}>Done</Button>
          </div>
        </div>
      ) : (
        <TokenForm
          busy={create.isPending}
          submit={(body) => create.mutate({ body })}
          problem={create.isError ? <ProblemNote error={create.error} /> : null}
        />
      )}
    </Dialog>
  );
}

function TokenForm({
  busy,
  submit,
  problem,
}: {
  busy: boolean;
  submit: (body: { name: string; scopes: Scope[]; expiresInDays: number | null }) => void;
  problem: React.ReactNode;
}) {
  const [name, setName] = useState('');
  const [chosen, setChosen] = useState<Scope[]>(['read']);
  const [days, setDays] = useState('90');
  const [tried, setTried] = useState(false);
  const onSubmit = (event: FormEvent) => {
    event.preventDefault();
    setTried(true);
    if (!name.trim() || chosen.length === 0) return;
    submit({ name: name.trim(), scopes: chosen, expiresInDays: days ? Number(days) : null });
  };
  const toggle = (scope: Scope, on: boolean) =>
    setChosen(on ? [...chosen, scope] : chosen.filter((each) => each !== scope));
  return (
    <form onSubmit={onSubmit} noValidate className="flex flex-col gap-4">
      <TextField
        label="Name"
        help="What it is for, e.g. the script that uses it."
        value={name}
        maxLength={200}
        onChange={(event) => setName(event.target.value)}
        error={tried && !name.trim() ? 'A token needs a name.' : undefined}
      />
      <fieldset>
        <legend className="mb-1 text-small">Scopes</legend>
        {scopes.map((scope) => (
          <label key={scope} className="flex min-h-7 items-baseline gap-2.5 text-small">
            <input
              type="checkbox"
              checked={chosen.includes(scope)}
              onChange={(event) => toggle(scope, event.target.checked)}
              className="size-4 translate-y-0.5 accent-(--ink)"
            />
            <span>
              <strong className="font-semibold">{scope}</strong> <span className="text-ink2">{scopeWords[scope]}</span>
            </span>
          </label>
        ))}
        {tried && chosen.length === 0 ? (
          <p role="alert" className="border-ink border-l-2 pl-2 font-semibold text-least">
            A token needs at least one scope.
          </p>
        ) : null}
      </fieldset>
      <SelectField label="Life" value={days} onChange={(event) => setDays(event.target.value)}>
        {lives.map((life) => (
          <option key={life.days} value={life.days}>
            {life.words}
          </option>
        ))}
      </SelectField>
      {problem}
      <div>
        <Button type="submit" look="main" busy={busy}>
          Create the token
        </Button>
      </div>
    </form>
  );
}
