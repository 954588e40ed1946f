/** A submission with work to start, and the person it belongs to, as the queue sees them when a slot is free. */
export interface Candidate {
  submissionId: string;
  accountId: string;
  tonight: boolean;
  /** Among one person's submissions only. */
  priority: number;
  createdAt: number;
  /** CPU milliseconds of one part. */
  partMs: number;
  memoryBytes: number;
  quotaLeft: boolean;
  virtualTime: number;
  person: { virtualTime: number; clock: number; running: number; maxSlots: number };
}

export interface FreeSlot {
  express: boolean;
  memoryBytes: number;
  night: boolean;
  /** Start tag of the person whose work was started last. */
  clock: number;
}

/** An express slot takes nothing longer. */
export const expressMs = 10_000;

/**
 * Whose work starts next: start-time fair queueing (P. Goyal, H. M. Vin, H. Cheng, IEEE/ACM Trans. Netw. 5 (1997) 690).
 * The pure form of the rule by which the database decides; tests hold the two together.
 */
export function nextTurn(candidates: readonly Candidate[], slot: FreeSlot): Candidate | undefined {
  const startable = candidates
    .filter(
      ({ tonight, partMs, memoryBytes, quotaLeft, person }) =>
        (slot.night || !tonight) &&
        memoryBytes <= slot.memoryBytes &&
        (!slot.express || partMs <= expressMs) &&
        quotaLeft &&
        person.running < person.maxSlots,
    )
    .map((candidate) => ({
      candidate,
      // inside the night window *tonight* goes first, except on express slots
      rank: slot.night && !slot.express && !candidate.tonight ? 1 : 0,
      own: Math.max(candidate.virtualTime, candidate.person.clock),
      tag: Math.max(candidate.person.virtualTime, slot.clock),
    }));
  const heads = new Map<string, (typeof startable)[number]>();
  for (const one of startable) {
    const head = heads.get(one.candidate.accountId);
    const before = head
      ? one.rank - head.rank ||
        head.candidate.priority - one.candidate.priority ||
        one.own - head.own ||
        byAge(one.candidate, head.candidate)
      : -1;
    if (before < 0) heads.set(one.candidate.accountId, one);
  }
  const [first] = [...heads.values()].sort(
    (a, b) =>
      a.rank - b.rank ||
      a.tag - b.tag ||
      a.candidate.person.running - b.candidate.person.running ||
      byAge(a.candidate, b.candidate),
  );
  return first?.candidate;
}

const byAge = (a: Candidate, b: Candidate): number =>
  a.createdAt - b.createdAt || (a.submissionId < b.submissionId ? -1 : 1);
