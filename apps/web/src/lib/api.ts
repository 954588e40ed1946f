import { type Endpoint, type EndpointId, endpoints } from '@nightcone/contracts';
import type { z } from 'zod';
import { ApiProblem, offlineProblem, problemOf } from './api-problem.ts';

type Endpoints = typeof endpoints;
type Part<E, Name extends string> = E extends { [key in Name]: infer S extends z.ZodType }
  ? { [key in Name]: z.input<S> }
  : unknown;
type OptionalQuery<E> = E extends { query: infer S extends z.ZodType }
  ? Record<string, never> extends z.input<S>
    ? { query?: z.input<S> }
    : { query: z.input<S> }
  : unknown;

/** What an endpoint is called with: `params`, `query` and `body`, each typed by the contract. */
export type InputOf<Id extends EndpointId> = Part<Endpoints[Id], 'params'> &
  OptionalQuery<Endpoints[Id]> &
  Part<Endpoints[Id], 'body'>;
/** What it answers. */
export type AnswerOf<Id extends EndpointId> = Endpoints[Id] extends { response: infer S extends z.ZodType }
  ? z.output<S>
  : undefined;

interface Call {
  params?: Record<string, unknown>;
  query?: Record<string, unknown>;
  body?: unknown;
}
export interface CallOptions {
  signal?: AbortSignal;
  /** The same key on a repeated write gives the first answer again. Made when absent. */
  idempotencyKey?: string;
}

/** Address of an endpoint, for links and streams. */
export function addressOf<Id extends EndpointId>(id: Id, input?: Omit<InputOf<Id>, 'body'>): string {
  const { params = {}, query = {} } = (input ?? {}) as Call;
  const path = endpoints[id].path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(String(params[name])));
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined && value !== '') search.set(name, String(value));
  }
  const text = search.toString();
  return `/api/v1${path}${text ? `?${text}` : ''}`;
}

/** Sends a request; refuses with an ApiProblem, also when nothing answers. */
async function send<Id extends EndpointId>(id: Id, input: Call, options: CallOptions): Promise<Response> {
  const { method } = endpoints[id] as Endpoint;
  const headers: Record<string, string> = { accept: 'application/json' };
  if (method !== 'get') headers['idempotency-key'] = options.idempotencyKey ?? newKey();
  if (input.body !== undefined) headers['content-type'] = 'application/json';
  let response: Response;
  try {
    response = await fetch(addressOf(id, input as never), {
      method: method.toUpperCase(),
      headers,
      credentials: 'same-origin',
      ...(input.body === undefined ? {} : { body: JSON.stringify(input.body) }),
      ...(options.signal ? { signal: options.signal } : {}),
    });
  } catch (error) {
    if (options.signal?.aborted) throw error;
    throw new ApiProblem(offlineProblem);
  }
  if (!response.ok) throw new ApiProblem(await problemOf(response));
  return response;
}

export const api = {
  /** `api.call('getJob', { params: { hash } })`: the answer, typed by the contract. */
  async call<Id extends EndpointId>(
    id: Id,
    ...[input, options]: Record<string, never> extends InputOf<Id>
      ? [input?: InputOf<Id>, options?: CallOptions]
      : [input: InputOf<Id>, options?: CallOptions]
  ): Promise<AnswerOf<Id>> {
    const response = await send(id, (input ?? {}) as Call, options ?? {});
    if (response.status === 204) return undefined as AnswerOf<Id>;
    return (await response.json()) as AnswerOf<Id>;
  },
  /** The same for raw bytes (arrays, kernel modules). */
  async bytes<Id extends EndpointId>(id: Id, input: InputOf<Id>, options: CallOptions = {}): Promise<ArrayBuffer> {
    return (await send(id, input as Call, options)).arrayBuffer();
  },
};

/** 128 random bits; `crypto.randomUUID` is missing on plain-http addresses of a local network. */
function newKey(): string {
  return Array.from(crypto.getRandomValues(new Uint8Array(16)), (byte) => byte.toString(16).padStart(2, '0')).join('');
}
