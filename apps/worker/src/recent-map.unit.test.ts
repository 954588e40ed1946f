import { expect, it } from 'vitest';
import { RecentMap } from './recent-map.ts';

it('drops what was used longest ago', () => {
  const map = new RecentMap<string, number>(2);
  map.set('a', 1);
  map.set('b', 2);
  expect(map.get('a')).toBe(1);
  map.set('c', 3);
  expect([map.get('a'), map.get('b'), map.get('c')]).toEqual([1, undefined, 3]);
});
