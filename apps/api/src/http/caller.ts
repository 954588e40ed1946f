import type { Request } from 'express';
import type { Caller } from '../context.ts';

const callers = new WeakMap<Request, Caller>();
export const callerOf = (req: Request): Caller | undefined => callers.get(req);
export const setCaller = (req: Request, caller: Caller): void => {
  callers.set(req, caller);
};
