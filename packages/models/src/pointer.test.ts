import { expect, test } from 'vitest';
import { getPointer, pointerOf, pointerTokens, setPointer } from './pointer.ts';

// Source: RFC 6901, section 5, the example document and its pointers (without the ones for numbers of URI fragments).
const example = {
  foo: ['bar', 'baz'],
  '': 0,
  'a/b': 1,
  'c%d': 2,
  'e^f': 3,
  'g|h': 4,
  'i\\j': 5,
  'k"l': 6,
  ' ': 7,
  'm~n': 8,
};

test.each([
  ['', example],
  ['/foo', ['bar', 'baz']],
  ['/foo/0', 'bar'],
  ['/', 0],
  ['/a~1b', 1],
  ['/c%d', 2],
  ['/e^f', 3],
  ['/g|h', 4],
  ['/i\\j', 5],
  ['/k"l', 6],
  ['/ ', 7],
  ['/m~0n', 8],
])('RFC 6901 example %s', (pointer, value) => {
  expect(getPointer(example, pointer)).toEqual(value);
  expect(pointerOf(pointerTokens(pointer))).toBe(pointer);
});

test('what is not there is undefined', () => {
  for (const pointer of ['/none', '/foo/2', '/foo/01', '/foo/length', '/foo/0/x', '/toString'])
    expect(getPointer(example, pointer)).toBeUndefined();
});

test.each(['foo', '/a~2', '/a~'])('%s is no pointer', (text) => {
  expect(() => pointerTokens(text)).toThrow(/no JSON Pointer/);
});

test('set returns a new document and shares the rest', () => {
  const before = { a: { b: [1, 2] }, c: { d: 1 } };
  const after = setPointer(before, '/a/b/1', 9);
  expect(after).toEqual({ a: { b: [1, 9] }, c: { d: 1 } });
  expect(before.a.b).toEqual([1, 2]);
  expect(after.c).toBe(before.c);
  expect(setPointer(before, '/a/b/-', 3)).toMatchObject({ a: { b: [1, 2, 3] } });
  expect(setPointer(before, '', 5)).toBe(5);
});

test('set refuses a place that cannot be', () => {
  expect(() => setPointer({ a: [1] }, '/a/3', 0)).toThrow(/no place “3”/);
  expect(() => setPointer({ a: 1 }, '/a/b', 0)).toThrow(/nothing at \/a/);
  expect(() => setPointer({}, '/a/b', 0)).toThrow(/nothing at \/a/);
});

test('set cannot reach a prototype', () => {
  const after = setPointer({ a: 1 } as { [name: string]: number }, '/__proto__', 1);
  expect(Object.getPrototypeOf(after)).toBe(Object.prototype);
});
