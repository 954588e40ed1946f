import type { Account, Token } from '@nightcone/contracts';
import type { AccountRow, TokenRow } from '@nightcone/db';

export const accountView = (row: AccountRow): Account => ({
  id: row.id,
  login: row.login,
  name: row.name,
  email: row.email,
  role: row.role,
  state: row.state,
  timeZone: row.timeZone,
  createdAt: row.createdAt.toISOString(),
});

export const tokenView = (row: TokenRow): Token => ({
  id: row.id,
  name: row.name,
  scopes: row.scopes as Token['scopes'],
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt?.toISOString() ?? null,
  lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
});
