const randomProbes = 200;

/**
 * Points at which the kernel itself is asked: the corners of the grid, its centre, and 200 others by a fixed generator
 * (multiplier and increment of Knuth's MMIX, TAOCP 2, 3.3.4); all points where there are not more.
 */
export function probeIndices(lengths: readonly number[]): number[] {
  const count = lengths.reduce((product, length) => product * length, 1);
  if (count <= randomProbes) return Array.from({ length: count }, (_, i) => i);
  const found = new Set<number>();
  const varied = lengths.filter((length) => length > 1).length;
  for (let corner = 0; corner < 2 ** varied; corner++) {
    let bits = corner;
    let index = 0;
    for (const length of lengths) {
      const last = length > 1 && bits % 2 === 1;
      if (length > 1) bits = Math.floor(bits / 2);
      index = index * length + (last ? length - 1 : 0);
    }
    found.add(index);
  }
  found.add(lengths.reduce((index, length) => index * length + Math.floor((length - 1) / 2), 0));
  let state = BigInt(count);
  for (let i = 0; i < randomProbes; i++) {
    state = BigInt.asUintN(64, state * 6_364_136_223_846_793_005n + 1_442_695_040_888_963_407n);
    found.add(Number((state >> 32n) % BigInt(count)));
  }
  return [...found].sort((a, b) => a - b);
}
