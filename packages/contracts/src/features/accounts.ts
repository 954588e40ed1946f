import { z } from 'zod';
import { admins, endpoint, everyone, roles, scopes } from '../endpoint.ts';
import { accountStates } from '../states.ts';
import { Id, Instant, PageQuery, pageOf, Title } from './common.ts';

export const Account = z.object({
  id: Id,
  login: z.string(),
  name: z.string(),
  email: z.string().nullable(),
  role: z.enum(roles),
  state: z.enum(accountStates),
  timeZone: z.string(),
  createdAt: Instant,
});
export type Account = z.infer<typeof Account>;

/** What every page needs to know; the group's settings are here so that no page asks twice. */
export const Session = z.object({
  account: Account.nullable(),
  group: z.object({ name: z.string(), timeZone: z.string(), nightFrom: z.string(), nightTo: z.string() }),
  kernel: z.object({ digest: z.string(), version: z.string() }).nullable(),
});
export type Session = z.infer<typeof Session>;

export const Token = z.object({
  id: Id,
  name: z.string(),
  scopes: z.array(z.enum(scopes)),
  createdAt: Instant,
  expiresAt: Instant.nullable(),
  lastUsedAt: Instant.nullable(),
});
export type Token = z.infer<typeof Token>;

export const OpenSession = z.object({
  id: z.string(),
  current: z.boolean(),
  createdAt: Instant,
  seenAt: Instant,
  agent: z.string(),
});

export const accountsEndpoints = {
  getSession: endpoint({
    id: 'getSession',
    method: 'get',
    path: '/session',
    summary: 'Who is signed in, and the group',
    access: 'anyone',
    scope: 'read',
    response: Session,
  }),
  endSession: endpoint({
    id: 'endSession',
    method: 'delete',
    path: '/session',
    summary: 'Sign out here',
    access: 'signed-in',
    scope: 'manage',
    status: 204,
  }),
  endAllSessions: endpoint({
    id: 'endAllSessions',
    method: 'delete',
    path: '/sessions',
    summary: 'Sign out everywhere',
    access: 'signed-in',
    scope: 'manage',
    status: 204,
  }),
  listSessions: endpoint({
    id: 'listSessions',
    method: 'get',
    path: '/sessions',
    summary: 'Where this account is signed in',
    access: 'signed-in',
    scope: 'manage',
    response: z.object({ rows: z.array(OpenSession) }),
  }),
  updateProfile: endpoint({
    id: 'updateProfile',
    method: 'patch',
    path: '/account',
    summary: 'Change one’s own profile',
    access: everyone,
    scope: 'manage',
    body: z.strictObject({ name: Title.optional(), timeZone: z.string().max(60).optional() }),
    response: Account,
  }),
  listTokens: endpoint({
    id: 'listTokens',
    method: 'get',
    path: '/tokens',
    summary: 'Personal access tokens',
    access: everyone,
    scope: 'manage',
    response: z.object({ rows: z.array(Token) }),
  }),
  createToken: endpoint({
    id: 'createToken',
    method: 'post',
    path: '/tokens',
    summary: 'Create a personal access token; its text is shown once',
    access: everyone,
    scope: 'manage',
    status: 201,
    body: z.strictObject({
      name: Title,
      scopes: z.array(z.enum(scopes)).min(1),
      expiresInDays: z.int().min(1).max(366).nullable().default(90),
    }),
    response: Token.extend({ text: z.string() }),
  }),
  revokeToken: endpoint({
    id: 'revokeToken',
    method: 'delete',
    path: '/tokens/:id',
    summary: 'Revoke a token',
    access: everyone,
    scope: 'manage',
    params: z.object({ id: Id }),
    status: 204,
  }),
  listAccounts: endpoint({
    id: 'listAccounts',
    method: 'get',
    path: '/accounts',
    summary: 'People',
    access: admins,
    scope: 'manage',
    query: PageQuery.extend({ state: z.enum(accountStates).optional() }),
    response: pageOf(Account),
  }),
  changeAccount: endpoint({
    id: 'changeAccount',
    method: 'patch',
    path: '/accounts/:id',
    summary: 'Admit, deactivate, or change the role of a person',
    access: admins,
    scope: 'manage',
    params: z.object({ id: Id }),
    body: z.strictObject({ state: z.enum(['active', 'deactivated']).optional(), role: z.enum(roles).optional() }),
    response: Account,
  }),
} as const;
