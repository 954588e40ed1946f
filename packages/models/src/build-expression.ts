import type { Expression } from './expression.ts';

/** Readable ways to write the expression trees of a definition. */
export const read = (pointer: string): Expression => ({ read: pointer });
export const is = (pointer: string, kind: string): Expression => ({ is: pointer, kind });
export const sum = (...args: Expression[]): Expression => ({ op: '+', args });
export const minus = (a: Expression, b: Expression): Expression => ({ op: '-', args: [a, b] });
export const times = (...args: Expression[]): Expression => ({ op: '*', args });
export const over = (a: Expression, b: Expression): Expression => ({ op: '/', args: [a, b] });
export const root = (a: Expression): Expression => ({ op: 'sqrt', args: [a] });
export const least = (...args: Expression[]): Expression => ({ op: 'min', args });
export const most = (...args: Expression[]): Expression => ({ op: 'max', args });
export const floor = (a: Expression): Expression => ({ op: 'floor', args: [a] });
/** a / b, rounded up, for positive integers. */
export const ceilOver = (a: Expression, b: number): Expression => floor(over(sum(a, b - 1), b));
/** 1 where the number at `pointer` differs from 0 by more than 1e-9, else less than 1. */
export const isNotZero = (pointer: string): Expression => least(1, times(1e18, read(pointer), read(pointer)));
