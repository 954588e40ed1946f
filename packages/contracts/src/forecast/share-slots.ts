/** What one person could use at an instant. */
export interface Demand {
  key: string;
  weight: number;
  /** Most slots that this person's work can fill now. */
  most: number;
}

/**
 * Max-min fair share of slots by weight ("water filling"): nobody gets more than they can use, and what they leave is
 * shared by the others. The long-run share of start-time fair queueing (P. Goyal, H. M. Vin, H. Cheng, IEEE/ACM Trans.
 * Netw. 5 (1997) 690), by which the queue picks whose work starts next.
 */
export function shareSlots(slots: number, demands: readonly Demand[]): Map<string, number> {
  const shares = new Map<string, number>();
  let open = demands.filter(({ most }) => most > 0);
  let left = slots;
  while (open.length > 0 && left > 1e-9) {
    const weights = open.reduce((sum, { weight }) => sum + weight, 0);
    const level = left / weights;
    const filled = open.filter(({ most, weight }) => most <= level * weight);
    if (filled.length === 0) {
      for (const { key, weight } of open) shares.set(key, level * weight);
      return shares;
    }
    for (const { key, most } of filled) {
      shares.set(key, most);
      left -= most;
    }
    open = open.filter((demand) => !filled.includes(demand));
  }
  return shares;
}
