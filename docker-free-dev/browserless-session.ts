import { setTimeout as wait } from 'node:timers/promises';
import type { JobView } from '@nightcone/contracts';

/** Signs in through the stand-in as a browser would, by following its redirects with a jar of cookies. */
export class BrowserlessSession {
  #cookies = new Map<string, string>();
  constructor(readonly url: string) {}

  async #ask(address: string, init: RequestInit = {}): Promise<Response> {
    const headers = new Headers(init.headers);
    // cookies go to the application alone, never to the provider
    if (address.startsWith(this.url)) {
      headers.set('cookie', [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; '));
      headers.set('sec-fetch-site', 'same-origin');
    }
    const answer = await fetch(address, { ...init, headers, redirect: 'manual' });
    if (address.startsWith(this.url)) {
      for (const cookie of answer.headers.getSetCookie()) {
        const [, name, value] = /^([^=]+)=([^;]*)/.exec(cookie) ?? [];
        if (name !== undefined && value !== undefined) this.#cookies.set(name, value);
      }
    }
    return answer;
  }

  async signIn(account: string): Promise<void> {
    const start = await this.#ask(`${this.url}/auth/github`);
    const choose = new URL(start.headers.get('location') ?? '', this.url);
    choose.searchParams.set('account', account);
    const chosen = await this.#ask(choose.href);
    await this.#ask(chosen.headers.get('location') ?? '');
    const session = await this.call<{ account: { login: string } | null }>('GET', '/session');
    if (session.account?.login !== account) throw new Error(`Signing in as ${account} did not work.`);
  }

  /** One request to /api/v1; throws the problem's sentence when it is refused. */
  async call<T>(method: string, path: string, body?: unknown, headers: Record<string, string> = {}): Promise<T> {
    const answer = await this.#ask(`${this.url}/api/v1${path}`, {
      method,
      headers: { ...headers, ...(body === undefined ? {} : { 'content-type': 'application/json' }) },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${path} was refused (${answer.status}): ${text}`);
    return (text === '' ? undefined : JSON.parse(text)) as T;
  }

  /** Digest of a job's result, as soon as there is one; throws when the job failed. */
  async resultOf(hash: string): Promise<string> {
    for (;;) {
      const job = await this.call<JobView>('GET', `/jobs/${hash}`);
      if (job.resultDigest) return job.resultDigest;
      if (job.state === 'failed') throw new Error(`Job ${hash} failed: ${job.failure?.text}`);
      await wait(100);
    }
  }
}
