/** People of an invented institute, named by what they do. The seed admits all but the newcomer. */
export interface DemoAccount {
  /** Id at the provider: the identity of the account. */
  providerId: number;
  login: string;
  name: string;
  role: 'theorist' | 'reviewer' | 'admin';
  /** Stays waiting until an admin admits it. */
  unknown?: true;
}

export const demoAccounts: readonly DemoAccount[] = [
  { providerId: 1001, login: 'theorist', name: 'Theorist', role: 'theorist' },
  { providerId: 1002, login: 'theorist-2', name: 'Second theorist', role: 'theorist' },
  { providerId: 1003, login: 'reviewer', name: 'Reviewer', role: 'reviewer' },
  { providerId: 1004, login: 'admin', name: 'Admin', role: 'admin' },
  { providerId: 1005, login: 'newcomer', name: 'Newcomer', role: 'theorist', unknown: true },
];
