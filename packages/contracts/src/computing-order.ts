/**
 * The order in which the points of a grid are computed: corners and centre first (they show mistakes at once), then by
 * repeated halving of every axis, so that the map is whole at some resolution at any time.
 * `shape` has the length of each axis; places are row-major, the last axis fastest. Every place comes exactly once.
 */
export function computingOrder(shape: readonly number[]): number[] {
  const ranks = shape.map(halvingRanks);
  const places = shape.reduce((product, length) => product * length, 1);
  const level = new Uint8Array(places);
  const order: number[] = [];
  for (let place = 0; place < places; place++) {
    let rest = place;
    let coarsest = 0;
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      const length = shape[axis] as number;
      coarsest = Math.max(coarsest, (ranks[axis] as Uint8Array)[rest % length] as number);
      rest = Math.floor(rest / length);
    }
    level[place] = coarsest;
    order.push(place);
  }
  return order.sort((a, b) => (level[a] as number) - (level[b] as number) || a - b);
}

/** Rank 0: both ends; then the middles of what is left, and so on: the round in which halving reaches each place. */
function halvingRanks(length: number): Uint8Array {
  const ranks = new Uint8Array(length);
  let gaps: [number, number][] = [[0, length - 1]];
  for (let rank = 1; gaps.length > 0; rank++) {
    const next: [number, number][] = [];
    for (const [from, to] of gaps) {
      if (to - from < 2) continue;
      const middle = (from + to) >> 1;
      ranks[middle] = rank;
      next.push([from, middle], [middle, to]);
    }
    gaps = next;
  }
  return ranks;
}
