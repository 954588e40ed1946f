import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Endpoint } from '@nightcone/contracts';
import { type Request, type RequestHandler, type Response, Router } from 'express';
import type { z } from 'zod';
import type { Caller, Context, Download, Handler, Input } from '../context.ts';
import { Refusal } from '../refusal.ts';
import type { Services } from '../services.ts';
import { callerOf } from './caller.ts';
import { fieldErrors } from './problems.ts';
import { readJson, refuseUnstorable } from './read-json.ts';

/** The policy of an endpoint, before anything of the request is read. Returns the caller where there is one. */
export function admit(endpoint: Endpoint, caller: Caller | undefined): Caller | undefined {
  if (endpoint.access === 'anyone') return caller;
  if (!caller) throw new Refusal('not-signed-in', 'Sign in, or send a personal access token.');
  if (!caller.scopes.includes(endpoint.scope))
    throw new Refusal('forbidden', `This token lacks the scope '${endpoint.scope}'.`);
  if (endpoint.access === 'signed-in') return caller;
  if (caller.account.state === 'waiting')
    throw new Refusal('account-waiting', 'An admin has to admit this account before it can be used.');
  if (!endpoint.access.includes(caller.account.role))
    throw new Refusal('forbidden', `This needs the role ${endpoint.access.join(' or ')}.`);
  return caller;
}

function parsePart(schema: z.ZodType | undefined, value: unknown, part: 'body' | 'query' | 'params'): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value ?? {});
  if (parsed.success) {
    if (part !== 'body') refuseUnstorable(parsed.data);
    return parsed.data;
  }
  const errors = fieldErrors(parsed.error, value, part);
  // A path that cannot name anything is an unknown thing, not a lesson about our identifiers.
  if (part === 'params') throw new Refusal('not-found', `Nothing has this address: ${errors[0]?.message}.`);
  const first = errors[0];
  throw new Refusal('invalid-input', `${first?.field || 'body'}: ${first?.message}`, { errors });
}

async function sendDownload(res: Response, download: Download): Promise<void> {
  res
    .status(200)
    .type(download.type)
    .set('cache-control', download.cache ?? 'private, no-cache');
  if (download.bytes !== undefined) res.set('content-length', String(download.bytes));
  if (download.etag) res.set('etag', `"${download.etag}"`);
  if (download.fileName) res.attachment(download.fileName);
  if (download.type === 'text/event-stream') res.set('x-accel-buffering', 'no');
  res.flushHeaders();
  try {
    await pipeline(Readable.from(download.chunks, { objectMode: false, highWaterMark: 65_536 }), res);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ERR_STREAM_PREMATURE_CLOSE') {
      // The status line is out: the only honest answer left is a broken connection.
      res.destroy(error as Error);
      throw error;
    }
  }
}

const isDownload = (value: unknown): value is Download =>
  typeof value === 'object' && value !== null && 'chunks' in value && 'type' in value;

/** Aborted when the connection closes before or after the answer. */
function signalOf(res: Response): AbortSignal {
  const abort = new AbortController();
  res.once('close', () => abort.abort());
  return abort.signal;
}

function answer<E extends Endpoint>(endpoint: E, handler: Handler<E>, services: Services): RequestHandler {
  return async (req: Request, res: Response) => {
    const input = {
      params: parsePart(endpoint.params, req.params, 'params'),
      query: parsePart(endpoint.query, req.query, 'query'),
      body: parsePart(endpoint.body, req.body, 'body'),
      idempotencyKey: idempotencyKeyOf(req),
    } as Input<E>;
    const context = { services, caller: callerOf(req), requestId: String(req.id), signal: signalOf(res) };
    const result: unknown = await handler({ ctx: context as Context<E>, input });
    if (isDownload(result)) return sendDownload(res, result);
    res.status(endpoint.status ?? 200).set('cache-control', 'no-store');
    if (endpoint.response === undefined) return void res.end();
    if (services.config.checkResponses) endpoint.response.parse(result);
    res.json(result);
  };
}

function idempotencyKeyOf(req: Request): string | undefined {
  const key = req.get('idempotency-key');
  if (key !== undefined && !/^[\x21-\x7e]{8,200}$/.test(key))
    throw new Refusal('invalid-input', 'Idempotency-Key: 8 to 200 visible ASCII characters.');
  return key;
}

/** Mounts every endpoint of the contract: first the policy, then the body, then the handler. */
export function mountEndpoints(
  table: readonly (readonly [Endpoint, Handler<Endpoint>])[],
  services: Services,
  before: (endpoint: Endpoint) => RequestHandler[],
): Router {
  const router = Router();
  for (const [endpoint, handler] of table) {
    const guard: RequestHandler = (req, _res, next) => {
      admit(endpoint, callerOf(req));
      next();
    };
    const body = endpoint.body ? readJson : [];
    router[endpoint.method](endpoint.path, guard, ...before(endpoint), ...body, answer(endpoint, handler, services));
  }
  return router;
}
