import { findModel } from '@nightcone/models';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { fillForm } from './fill-form.ts';
import { QuestionSheet } from './question-sheet.tsx';

const digest = 'a'.repeat(64);
const session = {
  account: { id: '1', role: 'theorist', state: 'active' },
  group: { name: 'Group', timeZone: 'UTC', nightFrom: '20:00', nightTo: '06:00' },
  kernel: { digest, version: '0.1.0' },
};
const estimate = {
  jobs: 1,
  alreadyComputed: 1,
  cpuMs: 2000,
  resultBytes: 4000,
  slices: 3,
  notes: [],
  quota: { grantedMs: 1e6, usedMs: 0, reservedMs: 0, afterMs: 9.9e5, fits: true },
  finish: { now: null, tonight: null },
  first: { hash: digest, canonicalText: '{}' },
};
class SilentWorker {
  onmessage = null;
  onerror = null;
  postMessage() {}
  terminate() {}
}
const asked: { path: string; body: unknown }[] = [];

beforeEach(() => {
  asked.length = 0;
  localStorage.clear();
  vi.stubGlobal('Worker', SilentWorker);
  vi.stubGlobal('matchMedia', () => ({ matches: false, addEventListener() {}, removeEventListener() {} }));
  vi.stubGlobal('fetch', async (path: string, init?: RequestInit) => {
    asked.push({ path, body: init?.body ? JSON.parse(String(init.body)) : null });
    const answer = path.includes('/session') ? session : path.includes('/estimate') ? estimate : { id: 'd' };
    return new Response(JSON.stringify(answer), { headers: { 'content-type': 'application/json' } });
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function show(id: string) {
  const model = findModel(id);
  if (!model) throw new Error(id);
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <MemoryRouter>
        <QuestionSheet model={model} first={fillForm(model, {})} untouched onPaste={() => undefined} />
      </MemoryRouter>
    </QueryClientProvider>,
  );
  return userEvent.setup();
}

test('a wrong entry is refused beside its field, with the allowed range, and nothing can be submitted', async () => {
  const user = show('continuum-ribbon');
  const field = screen.getByRole('textbox', { name: 'magnetic field' });
  await user.clear(field);
  await user.type(field, '5000');
  expect(field).toHaveAttribute('aria-invalid', 'true');
  expect(screen.getByRole('alert')).toHaveTextContent('-1000 to 1000 T');
  expect(screen.getByRole('button', { name: 'Submit now' })).toBeDisabled();
});

test('the sweep control makes a range, a ruler and a sweep for the server; again it makes one value', async () => {
  const user = show('continuum-ribbon');
  await user.click(screen.getByRole('button', { name: 'Sweep magnetic field' }));
  expect(screen.getByRole('textbox', { name: 'magnetic field' })).toHaveValue('0..10 / 11');
  const slider = screen.getByRole('slider', { name: /magnetic field/ });
  expect(slider).toHaveAttribute('aria-valuetext', '5 T');
  await waitFor(() => {
    const last = asked.filter(({ path }) => path.includes('/estimate')).at(-1)?.body;
    expect(last).toMatchObject({ axes: [{ pointers: ['/fieldT'], range: { start: '0', stop: '10', count: 11 } }] });
  });
  await user.click(screen.getByRole('button', { name: 'Stop sweeping magnetic field' }));
  expect(screen.queryByRole('slider')).toBeNull();
});

test('arrow keys step, and what is typed is kept in this browser', async () => {
  const user = show('landau-levels');
  const field = screen.getByRole('textbox', { name: 'Dirac velocity' });
  await user.click(field);
  await user.keyboard('{ArrowUp}');
  expect(field).toHaveValue('0.5752');
  await waitFor(() => expect(localStorage.getItem('nightcone.question.landau-levels')).toContain('0.5752'));
});

test('choosing another kind shows its members', async () => {
  const user = show('landau-levels');
  const system = within(screen.getByRole('group', { name: 'system' }));
  await user.click(system.getByRole('radio', { name: 'two layers' }));
  expect(screen.getByRole('textbox', { name: 'interlayer hopping' })).toHaveValue('0.39');
  expect(screen.queryByRole('textbox', { name: 'crossed field' })).toBeNull();
});

test('cost and what is known already are said, and one job is submitted as one job', async () => {
  const user = show('landau-levels');
  expect(await screen.findByText('1 of 1')).toBeInTheDocument();
  expect(screen.getByText(/computed before/)).toBeInTheDocument();
  await user.click(await screen.findByRole('button', { name: 'Submit now' }));
  await waitFor(() => expect(asked.some(({ path }) => path.endsWith('/api/v1/jobs'))).toBe(true));
  expect(asked.find(({ path }) => path.endsWith('/api/v1/jobs'))?.body).toMatchObject({
    when: 'now',
    specification: { model: 'landau-levels' },
  });
});
