import type { z } from 'zod';

export const roles = ['theorist', 'reviewer', 'admin'] as const;
export type Role = (typeof roles)[number];

/** Scopes of a personal access token. A browser session holds them all. */
export const scopes = ['read', 'submit', 'manage'] as const;
export type Scope = (typeof scopes)[number];

/** Who may call: anybody, anybody signed in (also while waiting), or an active account with one of the roles. */
export type Access = 'anyone' | 'signed-in' | readonly Role[];

/**
 * One endpoint, described once: the API mounts it, the web and the command line call it, OpenAPI prints it.
 * `path` is relative to /api/v1 with Express parameters (`/jobs/:hash`).
 */
export interface Endpoint {
  id: string;
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  summary: string;
  access: Access;
  scope: Scope;
  params?: z.ZodType;
  query?: z.ZodType;
  body?: z.ZodType;
  /** Absent for streams and raw bytes. */
  response?: z.ZodType;
  status?: number;
  /** Stable problem codes beside the common ones (problem.ts). */
  problems?: readonly string[];
}

/** Keeps the literal types of an endpoint while checking its shape. */
export const endpoint = <const E extends Endpoint>(description: E): E => description;

export const everyone: readonly Role[] = roles;
export const submitters: readonly Role[] = ['theorist', 'admin'];
export const admins: readonly Role[] = ['admin'];
