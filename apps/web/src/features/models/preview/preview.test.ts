import { findModel, type Json, manifestOf, models, parseSpecification, type Specification } from '@nightcone/models';
import { afterEach, expect, test, vi } from 'vitest';
import type { RunAnswer, RunRequest } from './messages.ts';
import { PreviewRunner, patienceMs, type WorkerLike } from './preview-runner.ts';
import { reduceSpecification, thinAxis } from './reduce-specification.ts';

const ribbon = findModel('continuum-ribbon') as NonNullable<ReturnType<typeof findModel>>;
const complete = (numerics: Record<string, Json> = {}): Specification => {
  const parsed = parseSpecification(manifestOf(models, 'test'), {
    model: 'continuum-ribbon',
    numerics,
    kernel: 'a'.repeat(64),
  });
  if (!parsed.ok) throw new Error(parsed.problems[0]?.message);
  return parsed.specification;
};
const costly = {
  ...ribbon,
  cost: { op: '*' as const, args: [{ read: '/parameters/kPerNm' }, 1000] },
  preview: [
    { pointer: '/parameters/kPerNm', axisCount: 60 },
    { pointer: '/numerics/grid', singleGridCells: 100 },
  ],
};

test('reductions are applied in order until the cost fits, and say what they left out', () => {
  const once = reduceSpecification(costly, complete(), 60_000);
  expect(once.stated).toEqual(['59 of 201 k']);
  expect(once.body.parameters.kPerNm).toMatchObject({ start: -1, stop: 1, count: 59 });
  expect(reduceSpecification(costly, complete(), 10).stated).toEqual(['59 of 201 k', 'one grid of 100 cells']);
  expect(reduceSpecification(costly, complete(), 1e9).stated).toEqual([]);
});

test('states stay on the thinned axis', () => {
  const { body } = reduceSpecification(costly, complete({ states: [0, 100, 200] }), 60_000);
  expect(body.numerics.states).toEqual([0, 29, 58]);
});

test('an axis keeps its ends and its centre', () => {
  expect(thinAxis({ kind: 'values', values: [0, 1, 2, 3, 4, 5, 6] }, 4)).toEqual({ kind: 'values', values: [0, 3, 6] });
  expect(thinAxis(5, 3)).toBeNull();
});

class StubWorker implements WorkerLike {
  posted: RunRequest[] = [];
  ended = false;
  onmessage: WorkerLike['onmessage'] = null;
  onerror: WorkerLike['onerror'] = null;
  postMessage(message: RunRequest) {
    this.posted.push(message);
  }
  terminate() {
    this.ended = true;
  }
  answer(answer: RunAnswer) {
    this.onmessage?.({ data: answer } as MessageEvent<RunAnswer>);
  }
}
const question = { digest: 'd', moduleUrl: '/m', specification: { model: 'm', parameters: {}, numerics: {} } };
afterEach(() => vi.useRealTimers());

test('an older answer is ignored once a newer question is asked', () => {
  const worker = new StubWorker();
  const heard: RunAnswer[] = [];
  const runner = new PreviewRunner(
    () => worker,
    (answer) => heard.push(answer),
  );
  const first = runner.run(question);
  const second = runner.run(question);
  worker.answer({ id: first, type: 'failed', message: 'old' });
  worker.answer({ id: second, type: 'failed', message: 'new' });
  expect(heard).toEqual([{ id: second, type: 'failed', message: 'new' }]);
  runner.stop();
});

test('a worker that sits in a slice is ended and the question goes to a new one', () => {
  vi.useFakeTimers();
  const workers: StubWorker[] = [];
  const runner = new PreviewRunner(
    () => {
      workers.push(new StubWorker());
      return workers.at(-1) as StubWorker;
    },
    () => {},
  );
  const first = runner.run(question);
  workers[0]?.answer({ id: first, type: 'taken' });
  const second = runner.run(question);
  vi.advanceTimersByTime(patienceMs + 1);
  expect(workers.map((worker) => worker.ended)).toEqual([true, false]);
  expect(workers[1]?.posted.map(({ id }) => id)).toEqual([second]);
  runner.stop();
});
