import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, expect, test, vi } from 'vitest';
import { createQueryClient } from '../../lib/query.ts';
import { browserWords } from './browser-words.ts';
import { Tokens } from './tokens.tsx';

afterEach(() => vi.unstubAllGlobals());

const token = {
  id: '0b9c1c52-6a51-4c5e-9d7b-0f4b6d1f1a11',
  name: 'cluster notebook',
  scopes: ['read'],
  createdAt: '2026-02-12T09:00:00Z',
  expiresAt: null,
  lastUsedAt: null,
};

/** Answers by method and path, and remembers what was asked. */
function serve(answers: Record<string, unknown>) {
  const asked: { request: string; body: unknown }[] = [];
  vi.stubGlobal(
    'fetch',
    vi.fn<typeof fetch>(async (address, init) => {
      const request = `${init?.method ?? 'GET'} ${String(address).replace('/api/v1', '')}`;
      asked.push({ request, body: init?.body ? JSON.parse(String(init.body)) : undefined });
      const body = answers[request];
      return body === undefined
        ? new Response(null, { status: 204 })
        : new Response(JSON.stringify(body), { headers: { 'content-type': 'application/json' } });
    }),
  );
  return asked;
}
const show = () =>
  render(
    <QueryClientProvider client={createQueryClient()}>
      <Tokens />
    </QueryClientProvider>,
  );

test('a token is created with its scopes and its text is shown once', async () => {
  const user = userEvent.setup();
  const asked = serve({ 'GET /tokens': { rows: [] }, 'POST /tokens': { ...token, text: 'nct_secret' } });
  show();
  await user.click(await screen.findByRole('button', { name: 'Create a token' }));
  const dialog = within(await screen.findByRole('dialog'));
  await user.click(dialog.getByRole('button', { name: 'Create the token' }));
  expect(dialog.getByText('A token needs a name.')).toBeInTheDocument();
  await user.type(dialog.getByLabelText('Name'), 'cluster notebook');
  await user.click(dialog.getByLabelText(/submit/));
  await user.click(dialog.getByRole('button', { name: 'Create the token' }));
  expect(await dialog.findByText('nct_secret')).toBeInTheDocument();
  expect(asked.find(({ request }) => request === 'POST /tokens')?.body).toEqual({
    name: 'cluster notebook',
    scopes: ['read', 'submit'],
    expiresInDays: 90,
  });
  await user.click(dialog.getByRole('button', { name: 'Done' }));
  expect(screen.queryByText('nct_secret')).toBeNull();
});

test('a token is revoked only after a second click', async () => {
  const user = userEvent.setup();
  const asked = serve({ 'GET /tokens': { rows: [token] } });
  show();
  await user.click(await screen.findByRole('button', { name: 'Revoke cluster notebook …' }));
  expect(asked.some(({ request }) => request.startsWith('DELETE'))).toBe(false);
  await user.click(screen.getByRole('button', { name: 'Revoke cluster notebook' }));
  await vi.waitFor(() => expect(asked.map(({ request }) => request)).toContain(`DELETE /tokens/${token.id}`));
});

test('browsers by name', () => {
  expect(browserWords('Mozilla/5.0 (X11; Linux x86_64; rv:153.0) Gecko/20100101 Firefox/153.0')).toBe(
    'Firefox on Linux',
  );
  expect(browserWords('Mozilla/5.0 (X11; Linux x86_64) AppleWebKit/537.36 Chrome/156.0 Safari/537.36')).toBe(
    'Chromium on Linux',
  );
  expect(browserWords('')).toBe('unknown browser');
});
