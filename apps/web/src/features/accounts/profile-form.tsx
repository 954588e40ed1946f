import type { Account } from '@nightcone/contracts';
import { type FormEvent, useState } from 'react';
import { Button } from '../../components/button.tsx';
import { SelectField, TextField } from '../../components/field.tsx';
import { ProblemNote } from '../../components/problem-note.tsx';
import { useAction } from '../../lib/query.ts';
import { chooseTheme, type ThemeChoice, useThemeChoice } from '../../lib/theme.ts';

const zones = (): string[] => Intl.supportedValuesOf?.('timeZone') ?? [];

/** Name and time zone are kept on the server; the look belongs to this browser. */
export function ProfileForm({ account }: { account: Account }) {
  const [name, setName] = useState(account.name);
  const [timeZone, setTimeZone] = useState(account.timeZone);
  const save = useAction('updateProfile', { refreshes: ['getSession'] });
  const look = useThemeChoice();
  const changed = name.trim() !== account.name || timeZone !== account.timeZone;
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (changed && name.trim()) save.mutate({ body: { name: name.trim(), timeZone } });
  };
  const fieldError = (field: string) => save.error?.problem.errors?.find((each) => each.field === `/${field}`)?.message;
  return (
    <section aria-labelledby="profile">
      <h2 id="profile">Profile</h2>
      <form onSubmit={submit} className="mt-3 grid max-w-160 gap-x-6 gap-y-4 sm:grid-cols-2">
        <TextField
          label="Name"
          help="Seen by admins; to others you are a theorist with a number."
          value={name}
          maxLength={200}
          autoComplete="name"
          onChange={(event) => setName(event.target.value)}
          error={name.trim() ? fieldError('name') : 'A name has at least one letter.'}
        />
        <SelectField
          label="Time zone"
          help="For mail to you. Pages show the group’s clock."
          value={timeZone}
          onChange={(event) => setTimeZone(event.target.value)}
          error={fieldError('timeZone')}
        >
          {[...new Set([account.timeZone, ...zones()])].map((zone) => (
            <option key={zone}>{zone}</option>
          ))}
        </SelectField>
        <SelectField
          label="Look"
          help="In this browser."
          value={look}
          onChange={(event) => chooseTheme(event.target.value as ThemeChoice)}
        >
          <option value="system">as the system</option>
          <option value="paper">Paper</option>
          <option value="night">Night</option>
        </SelectField>
        <div className="flex items-center gap-4 sm:col-span-2">
          <Button type="submit" busy={save.isPending} disabled={!changed || !name.trim()}>
            Save the profile
          </Button>
          <span role="status" className="text-ink2 text-small">
            {save.isSuccess && !changed ? 'Saved.' : ''}
          </span>
        </div>
      </form>
      {save.isError && !save.error.problem.errors?.length ? <ProblemNote error={save.error} /> : null}
    </section>
  );
}
