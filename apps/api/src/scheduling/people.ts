import type { Person, Role } from '@nightcone/contracts';
import { listPeople, type Queryable } from '@nightcone/db';
import type { Caller } from '../context.ts';

export interface KnownPerson {
  id: string;
  name: string;
  role: Role;
}

/** How people show to a viewer: 'you', 'theorist 2', 'review'; admins see names. */
export function labelPeople(people: readonly KnownPerson[], viewer: Pick<KnownPerson, 'id' | 'role'>) {
  const counts = new Map<Role, number>();
  const labels = new Map<string, string>();
  for (const { id, role } of people) {
    const number = (counts.get(role) ?? 0) + 1;
    counts.set(role, number);
    labels.set(id, role === 'reviewer' ? 'review' : role === 'admin' && number === 1 ? 'admin' : `${role} ${number}`);
  }
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const label = (id: string): string => {
    if (id === viewer.id) return 'you';
    const plain = labels.get(id) ?? 'somebody';
    return viewer.role === 'admin' ? (names.get(id) ?? plain) : plain;
  };
  return {
    person: (id: string): Person => ({ id, label: label(id) }),
    /** Names are for admins only. */
    name: (id: string): string | null => (viewer.role === 'admin' ? (names.get(id) ?? null) : null),
  };
}
export type Labels = ReturnType<typeof labelPeople>;

export const readLabels = async (db: Queryable, { account }: Caller): Promise<Labels> =>
  labelPeople(await listPeople(db), account);
