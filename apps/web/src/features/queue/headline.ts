import type { LastNight, Night, Submission } from '@nightcone/contracts';
import { formatCount, plural } from '../../lib/format-quantity.ts';
import { formatClock } from '../../lib/format-time.ts';

const numbers = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten'];
const counted = (count: number) => numbers[count] ?? formatCount(count);
const nouns = { sweep: 'sweep', job: 'job', 're-run': 're-run' };

/** One or two sentences that answer 'how is my work?'. */
export function headline(
  submissions: readonly Submission[],
  night: Night | undefined,
  lastNight: LastNight | undefined,
  timeZone: string,
): string {
  const mine = submissions.filter((each) => each.mine && (each.state === 'active' || each.state === 'paused'));
  if (mine.length === 0) return idleSentence(lastNight);
  const end = night?.myEnd ? ` Your last job should end at ${formatClock(night.myEnd.at, timeZone)}.` : '';
  return `${workSentence(mine, night, timeZone)}${end}`;
}

function workSentence(mine: readonly Submission[], night: Night | undefined, timeZone: string): string {
  const [first] = mine;
  const running = mine.filter(
    (each) => each.state === 'active' && (each.progress.running > 0 || each.progress.done > 0),
  );
  if (running.length === 1 && running[0]) {
    const { kind, progress, unit } = running[0];
    return `Your ${nouns[kind]} is at ${formatCount(progress.done)} of ${plural(progress.total, unit.slice(0, -1))}.`;
  }
  if (running.length > 1) return `${counted(running.length)} of your questions are running.`;
  if (mine.every((each) => each.state === 'paused')) {
    return mine.length === 1 && first
      ? `Your ${nouns[first.kind]} is paused.`
      : `${counted(mine.length)} of your questions are paused.`;
  }
  if (night && !night.window.open && mine.every((each) => each.when === 'tonight')) {
    return `Your work starts when the night window opens at ${formatClock(night.window.from, timeZone)}.`;
  }
  return mine.length === 1 && first
    ? `Your ${nouns[first.kind]} is waiting for its turn.`
    : `${counted(mine.length)} of your questions are waiting for their turn.`;
}

function idleSentence(lastNight: LastNight | undefined): string {
  const total = lastNight ? lastNight.finished + lastNight.failed : 0;
  if (!lastNight || total === 0) return 'Nothing of yours is running.';
  return lastNight.failed === 0
    ? `Last night finished all ${plural(total, 'job')}.`
    : `Last night finished ${formatCount(lastNight.finished)} of ${plural(total, 'job')}.`;
}
