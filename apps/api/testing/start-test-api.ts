// The test server's URL is provided under a name that is declared there.

import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { type AuditRow, adjustQuota, type Db, findQuota, listAuditEntries, saveSettings } from '@nightcone/db';
import { createTestDatabase } from '@nightcone/db/testing';
import { pino } from 'pino';
import request from 'supertest';
import { demoAccounts } from '../../../docker-free-dev/sign-in-provider/demo-accounts.ts';
import { type Provider, startProvider } from '../../../docker-free-dev/sign-in-provider/start-provider.ts';
import type {} from '../../../packages/db/testing/server.ts';
import { createApp } from '../src/app.ts';
import { type Config, readConfig } from '../src/config.ts';
import { startServices } from '../src/start-services.ts';

export type Login = 'theorist' | 'theorist-2' | 'reviewer' | 'admin' | 'newcomer';
export type Agent = ReturnType<typeof request.agent>;

export interface TestApi {
  url: string;
  provider: Provider;
  db: Db;
  databaseUrl: string;
  /** A caller without a session. */
  anonymous: () => Agent;
  /** Signed in through the provider; all but the newcomer are admitted with their roles. */
  as: (login: Login) => Promise<Agent>;
  /** Grants or takes so that this many milliseconds are free this week. */
  setFreeQuota: (login: Login, ms: number) => Promise<void>;
  /** What the audit says of something, the oldest first. */
  listAudit: (subjectId: string) => Promise<AuditRow[]>;
  /** Everything that was computed ended at this instant. */
  moveExecutions: (to: Date) => Promise<void>;
  stop: () => Promise<void>;
}

/** Goes the whole way of a browser: start, choose an account at the provider, come back. */
export async function signInAs(agent: Agent, login: Login, returnTo = '/'): Promise<string> {
  const start = await agent.get(`/auth/github?returnTo=${encodeURIComponent(returnTo)}`).expect(302);
  const choose = new URL(start.headers.location as string);
  choose.searchParams.set('account', login);
  const chosen = await fetch(choose, { redirect: 'manual' });
  const back = new URL(chosen.headers.get('location') as string);
  const end = await agent.get(back.pathname + back.search).expect(302);
  return end.headers.location as string;
}

/** A whole API over a database of its own and a provider of its own, on free ports. */
export async function startTestApi(change: Partial<Config> = {}): Promise<TestApi> {
  const [database, provider] = await Promise.all([
    createTestDatabase(),
    startProvider({ clientId: 'test-client', clientSecret: 'test-secret' }),
  ]);
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const admin = demoAccounts.find(({ login }) => login === 'admin');
  const config: Config = {
    ...readConfig({
      ...provider.environment,
      NIGHTCONE_DATABASE_URL: database.url,
      NIGHTCONE_SESSION_SECRET: 'only for tests, and long enough for the check',
      NIGHTCONE_PUBLIC_URL: url,
      NIGHTCONE_FIRST_ADMIN: String(admin?.providerId),
      NIGHTCONE_LOG_LEVEL: 'silent',
    }),
    rateLimits: { requests: 100_000, plans: 100_000, lookups: 100_000, signIns: 100_000 },
    checkResponses: true,
    ...change,
  };
  const running = startServices(config, pino({ level: config.logLevel }));
  const { db, changes } = running.services;
  const heard = new Promise<void>((resolve) => {
    const stopWaiting = changes.onChange(({ topic }) => {
      if (topic !== 'connected') return;
      stopWaiting();
      resolve();
    });
  });
  await saveSettings(db, nobody, { groupName: 'Test group', timeZone: 'Europe/Berlin' });
  server.on('request', createApp(running.services, running.pool));
  await heard;

  const anonymous = () => request.agent(url);
  const agents = new Map<Login, Agent>();
  const as = async (login: Login): Promise<Agent> => {
    const known = agents.get(login);
    if (known) return known;
    const agent = anonymous();
    await signInAs(agent, login);
    const demo = demoAccounts.find((account) => account.login === login);
    if (login !== 'admin' && !demo?.unknown) {
      const { body } = await agent.get('/api/v1/session').expect(200);
      const admit = { state: 'active', role: demo?.role };
      await (await as('admin')).patch(`/api/v1/accounts/${body.account.id}`).set(sameOrigin).send(admit).expect(200);
    }
    agents.set(login, agent);
    return agent;
  };
  const setFreeQuota = async (login: Login, ms: number) => {
    const { body } = await (await as(login)).get('/api/v1/session').expect(200);
    const { grantedMs, usedMs, reservedMs } = await findQuota(db, body.account.id);
    const change = ms - (grantedMs - usedMs - reservedMs);
    await adjustQuota(db, nobody, { accountId: body.account.id, ms: change, reason: 'test' });
  };
  const moveExecutions = async (to: Date) => {
    await running.pool.query('update executions set finished_at = $1 where finished_at is not null', [to]);
  };
  const stop = async () => {
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
    await running.stop();
    await provider.close();
    await database.drop();
  };
  return {
    url,
    provider,
    db,
    databaseUrl: database.url,
    anonymous,
    as,
    setFreeQuota,
    listAudit: (id) => listAuditEntries(db, id),
    moveExecutions,
    stop,
  };
}

const nobody = { accountId: null, requestId: null };
/** What a browser adds to its own requests. */
export const sameOrigin = { 'sec-fetch-site': 'same-origin' };
