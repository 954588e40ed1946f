import { sql } from 'drizzle-orm';
import type { Db } from '../../client.ts';
import { QuotaExceeded } from '../../errors.ts';
import { type Actor, saveAuditEntry } from '../audit.ts';

/** Starts nothing more of it; what is running stops at the next end of a task. False: it was not active. */
export const pauseSubmission = (db: Db, actor: Actor, id: string) => change(db, actor, id, 'pause');

/** False: it was not paused. */
export const resumeSubmission = (db: Db, actor: Actor, id: string) => change(db, actor, id, 'resume');

/** Stops it now; what is finished is kept. False: it had ended. */
export const cancelSubmission = (db: Db, actor: Actor, id: string) => change(db, actor, id, 'cancel');

const functions = {
  pause: sql`queue.pause`,
  resume: sql`queue.resume`,
  cancel: sql`queue.cancel`,
};

function change(db: Db, actor: Actor, id: string, verb: keyof typeof functions): Promise<boolean> {
  return db.transaction(async (tx) => {
    const { rows } = await tx.execute<{ changed: boolean }>(sql`select ${functions[verb]}(${id}::uuid) as changed`);
    const changed = rows[0]?.changed === true;
    if (changed) {
      await saveAuditEntry(tx, actor, { action: `submissions.${verb}`, subject: 'submission', subjectId: id });
    }
    return changed;
  });
}

/** Puts broken-off points back into the backlog; how many. Throws QuotaExceeded. */
export function retryBrokenOff(db: Db, actor: Actor, id: string): Promise<number> {
  return db.transaction(async (tx) => {
    const { rows } = await tx.execute<{ points: number; shortMs: string }>(
      sql`select points, short_ms as "shortMs" from queue.retry_broken_off(${id}::uuid)`,
    );
    const { points, shortMs } = rows[0] as { points: number; shortMs: string };
    if (Number(shortMs) > 0) throw new QuotaExceeded(Number(shortMs), 0);
    if (points > 0) {
      await saveAuditEntry(tx, actor, {
        action: 'sweeps.retry-failed',
        subject: 'submission',
        subjectId: id,
        after: { points },
      });
    }
    return points;
  });
}
