import { accountStates, roles } from '@nightcone/contracts';
import { check, index, json, pgTable, text, timestamp, uniqueIndex, uuid, varchar } from 'drizzle-orm/pg-core';
import { instant, isDigest, oneOf } from './columns.ts';

/** People. The provider's id is the identity; an e-mail address is never matched. */
export const accounts = pgTable(
  'accounts',
  {
    id: uuid().primaryKey().defaultRandom(),
    providerId: text().notNull().unique(),
    login: text().notNull(),
    name: text().notNull(),
    email: text(),
    role: text({ enum: roles }).notNull().default('theorist'),
    state: text({ enum: accountStates }).notNull().default('waiting'),
    timeZone: text().notNull().default('UTC'),
    createdAt: instant().notNull().defaultNow(),
    admittedAt: instant(),
  },
  () => [check('accounts_role', oneOf('role', roles)), check('accounts_state', oneOf('state', accountStates))],
);

/** The columns are those of connect-pg-simple. */
export const sessions = pgTable(
  'sessions',
  {
    sid: varchar().primaryKey(),
    sess: json().notNull(),
    expire: timestamp({ precision: 6 }).notNull(),
  },
  (table) => [index('sessions_expire').on(table.expire)],
);

/** Personal access tokens; only the SHA-256 of the token's text is kept. */
export const accessTokens = pgTable(
  'access_tokens',
  {
    id: uuid().primaryKey().defaultRandom(),
    accountId: uuid()
      .notNull()
      .references(() => accounts.id, { onDelete: 'cascade' }),
    name: text().notNull(),
    hash: text().notNull().unique(),
    scopes: text().array().notNull(),
    createdAt: instant().notNull().defaultNow(),
    expiresAt: instant(),
    lastUsedAt: instant(),
    revokedAt: instant(),
  },
  (table) => [index('access_tokens_account').on(table.accountId), check('access_tokens_hash', isDigest('hash'))],
);

/** An invitation admits whoever opens its link; only the SHA-256 of the link's secret is kept. */
export const accountInvitations = pgTable(
  'account_invitations',
  {
    id: uuid().primaryKey().defaultRandom(),
    hash: text().notNull(),
    email: text().notNull(),
    role: text({ enum: roles }).notNull(),
    invitedBy: uuid()
      .notNull()
      .references(() => accounts.id),
    createdAt: instant().notNull().defaultNow(),
    expiresAt: instant().notNull(),
    usedBy: uuid().references(() => accounts.id),
    usedAt: instant(),
  },
  (table) => [
    uniqueIndex('account_invitations_hash').on(table.hash),
    check('account_invitations_role', oneOf('role', roles)),
    check('account_invitations_hash_form', isDigest('hash')),
  ],
);
