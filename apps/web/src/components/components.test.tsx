import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, test, vi } from 'vitest';
import { ApiProblem } from '../lib/api-problem.ts';
import { HashComb, HashMark } from './hash-comb.tsx';
import { ProblemNote } from './problem-note.tsx';
import { progressWords, rulerCells } from './progress-ruler.tsx';
import { StateMark } from './state-mark.tsx';

const hash = '7f3a9c2104be'.padEnd(64, '0');

test('a state is a word and a shape', () => {
  const { container } = render(<StateMark state="broken-off" />);
  expect(container).toHaveTextContent('broken off');
  expect(container.querySelector('svg path')).not.toBeNull();
});

test('the same digest always gives the same comb, another digest another one', () => {
  const draw = (digest: string) => render(<HashComb hash={digest} />).container.innerHTML;
  expect(draw(hash)).toBe(draw(hash));
  expect(draw(hash)).not.toBe(draw(`8${hash.slice(1)}`));
});

test('a click on the hash copies all of it and says so', async () => {
  const user = userEvent.setup();
  const write = vi.spyOn(navigator.clipboard, 'writeText').mockResolvedValue();
  render(<HashMark hash={hash} what="job hash" />);
  await user.click(screen.getByRole('button', { name: /7f3a·9c21·04be/ }));
  expect(write).toHaveBeenCalledWith(hash);
  expect(await screen.findByText('Copied')).toBeInTheDocument();
});

test('a ruler has one cell for each job while they fit, and shares after that', () => {
  const small = rulerCells({ done: 2, failed: 1, running: 1, total: 6 }, 100);
  expect(small).toEqual(['done', 'done', 'failed', 'running', 'waiting', 'waiting']);
  const large = rulerCells({ done: 999, failed: 1, running: 0, total: 100_000 }, 50);
  expect(large).toHaveLength(50);
  expect(large.filter((cell) => cell === 'done')).toHaveLength(0);
  expect(large).toContain('failed');
});

test('progress in words', () => {
  expect(progressWords({ done: 14, failed: 0, running: 4, total: 25 }, 'jobs')).toBe('14 of 25 jobs done, 4 running');
});

test('a refusal says what happened, which field, and offers another try', async () => {
  const retry = vi.fn();
  render(
    <ProblemNote
      error={
        new ApiProblem({
          type: 'about:blank',
          title: 'Invalid',
          status: 422,
          code: 'invalid-specification',
          detail: 'One value is outside its range.',
          requestId: 'r-17',
          errors: [{ field: '/parameters/fieldT', message: 'is above the largest field', limit: '0 … 200 T' }],
        })
      }
      retry={retry}
    />,
  );
  const alert = screen.getByRole('alert');
  expect(alert).toHaveTextContent('One value is outside its range.');
  expect(alert).toHaveTextContent('/parameters/fieldT is above the largest field (0 … 200 T)');
  expect(alert).toHaveTextContent('r-17');
  await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
  expect(retry).toHaveBeenCalledOnce();
});
