import { randomUUID } from 'node:crypto';
import { type EndpointId, endpoints, Problem } from '@nightcone/contracts';
import type { z } from 'zod';
import { exitCodes } from '../lib/exit-codes.ts';
import { CommandFailure } from '../lib/failure.ts';
import type { ServerAccount } from './account-file.ts';

type Endpoints = typeof endpoints;
type Answer<Id extends EndpointId> = Endpoints[Id] extends { response: infer S extends z.ZodType }
  ? z.output<S>
  : undefined;

interface Call {
  params?: Record<string, string>;
  query?: Record<string, string>;
  body?: unknown;
  /** The same key on a repeated write gives the first answer again. */
  idempotencyKey?: string;
}

/** Calls the endpoints of the contract with a token. */
export class ApiClient {
  constructor(private readonly account: ServerAccount) {}

  async call<Id extends EndpointId>(id: Id, input: Call = {}): Promise<Answer<Id>> {
    const response = await this.send(id, input);
    const text = await response.text();
    return (text === '' ? undefined : JSON.parse(text)) as Answer<Id>;
  }

  /** The raw bytes of a download. */
  async download(id: EndpointId, input: Call = {}): Promise<Uint8Array> {
    return new Uint8Array(await (await this.send(id, input)).arrayBuffer());
  }

  private async send(id: EndpointId, { params = {}, query = {}, body, idempotencyKey }: Call): Promise<Response> {
    const { method, path } = endpoints[id];
    const filled = path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(params[name] ?? ''));
    const search = new URLSearchParams(query).toString();
    const address = `${this.account.url}/api/v1${filled}${search === '' ? '' : `?${search}`}`;
    const headers: Record<string, string> = { authorization: `Bearer ${this.account.token}` };
    if (method !== 'get') headers['idempotency-key'] = idempotencyKey ?? randomUUID();
    if (body !== undefined) headers['content-type'] = 'application/json';
    const request = {
      method: method.toUpperCase(),
      headers,
      body: body === undefined ? undefined : JSON.stringify(body),
    };
    const response = await fetch(address, request).catch((error: Error) => {
      throw new CommandFailure(exitCodes.failed, `${this.account.url} does not answer: ${reasonOf(error)}`);
    });
    if (!response.ok) throw await refusalOf(response);
    return response;
  }
}

const reasonOf = (error: Error) => (error.cause instanceof Error ? error.cause.message : error.message);

/** A 4xx is wrong input, with the server's problem document; anything else is a failure of the server. */
async function refusalOf(response: Response): Promise<CommandFailure> {
  const parsed = Problem.safeParse(await response.json().catch(() => undefined));
  if (!parsed.success)
    return new CommandFailure(exitCodes.failed, `The server answered ${response.status} without saying why.`);
  const exitCode = response.status < 500 ? exitCodes.wrongInput : exitCodes.failed;
  return new CommandFailure(exitCode, parsed.data.detail, parsed.data);
}
