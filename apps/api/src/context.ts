import type { Account, Endpoint, Scope } from '@nightcone/contracts';
import type { z } from 'zod';
import type { Services } from './services.ts';

/** Who makes a request, and with what: a browser session holds every scope, a token those it was given. */
export interface Caller {
  account: Account;
  scopes: readonly Scope[];
  /** Set for browsers. */
  sessionId?: string;
  /** Set for scripts. */
  tokenId?: string;
}

/** Bytes instead of JSON: a file, an array, or a stream of events. */
export interface Download {
  type: string;
  chunks: AsyncIterable<Uint8Array | string> | Iterable<Uint8Array | string>;
  /** Length in bytes where it is known beforehand. */
  bytes?: number;
  fileName?: string;
  /** Content-addressed bodies may be kept by caches. */
  etag?: string;
  cache?: string;
}

type Parsed<E, Part extends string> = E extends { [K in Part]: infer S extends z.ZodType } ? z.output<S> : undefined;

export interface Input<E extends Endpoint = Endpoint> {
  params: Parsed<E, 'params'>;
  query: Parsed<E, 'query'>;
  body: Parsed<E, 'body'>;
  idempotencyKey: string | undefined;
}

export interface Context<E extends Endpoint = Endpoint> {
  services: Services;
  caller: E['access'] extends 'anyone' ? Caller | undefined : Caller;
  requestId: string;
  /** Aborts when the connection closes. */
  signal: AbortSignal;
}

export type Answer<E extends Endpoint> = E extends { response: infer R extends z.ZodType }
  ? z.input<R>
  : E extends { status: 204 }
    ? undefined
    : Download;

/** The one shape of a verb; a long answer may be streamed as JSON text. `Verb<typeof endpoints.getJob>` types its context, input and answer. */
export type Handler<E extends Endpoint> = (given: {
  ctx: Context<E>;
  input: Input<E>;
}) => Promise<Answer<E> | Download>;
