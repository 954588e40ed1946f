import type { Submission, Sweep } from '@nightcone/contracts';

type Counted = Pick<Sweep, 'points' | 'counts' | 'submission'>;

const sum = (counts: Sweep['counts'], ...states: (keyof Sweep['counts'])[]) =>
  states.reduce((total, state) => total + (counts[state] ?? 0), 0);

/** Points as progress: reused results are done, broken-off points count as failed until they are put back. */
export function sweepProgress({ points, counts }: Counted): Submission['progress'] {
  return {
    total: points,
    done: sum(counts, 'finished', 'reused'),
    running: sum(counts, 'running'),
    failed: sum(counts, 'failed', 'broken-off'),
  };
}

/** The word beside a sweep: what its submission is, said as people ask for it. */
export function sweepStateWord(sweep: Counted): string {
  const { submission } = sweep;
  const { done, failed, running } = sweepProgress(sweep);
  if (submission.state === 'done') return failed > 0 ? 'finished, some failed' : 'finished';
  if (submission.state !== 'active') return submission.state;
  if (running > 0 || done > 0) return 'running';
  return submission.when === 'tonight' ? 'tonight' : 'waiting';
}
