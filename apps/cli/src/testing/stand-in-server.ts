import { createServer, type IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import { json } from 'node:stream/consumers';

export interface Asked {
  method: string;
  path: string;
  headers: IncomingMessage['headers'];
  body: unknown;
}
/** What the stand-in answers to `METHOD /path` below /api/v1: a status and a body, or raw bytes. */
export type Answers = Record<string, (asked: Asked) => { status?: number; body?: unknown; bytes?: Uint8Array }>;

/** A server on a free loopback port that answers as it is told and remembers what it was asked. */
export async function standInServer(answers: Answers) {
  const asked: Asked[] = [];
  const server = createServer(async (request, response) => {
    const path = (request.url ?? '').replace(/^\/api\/v1/, '');
    const hasBody = request.headers['content-type'] === 'application/json';
    const body = hasBody ? await json(request) : undefined;
    const entry = { method: request.method ?? '', path, headers: request.headers, body };
    asked.push(entry);
    const answer = answers[`${entry.method} ${path.split('?')[0]}`]?.(entry) ?? {
      status: 404,
      body: { type: 'about:blank', title: 'Not found', status: 404, code: 'not-found', detail: 'Nothing is here.' },
    };
    response.writeHead(answer.status ?? 200, { 'content-type': 'application/json' });
    response.end(answer.bytes ?? JSON.stringify(answer.body));
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return {
    asked,
    url,
    env: { NIGHTCONE_URL: url, NIGHTCONE_TOKEN: 'nct_test' },
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
