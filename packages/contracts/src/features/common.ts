import { z } from 'zod';

export const Hash = z.string().regex(/^[0-9a-f]{64}$/, 'a hash is 64 hexadecimal digits');
export const Id = z.uuid();
export const Instant = z.iso.datetime();
export const Title = z.string().trim().min(1).max(200);
/** An instant with the uncertainty of its estimate. */
export const Expected = z.object({ at: Instant, plusMinusS: z.number() });
export type Expected = z.infer<typeof Expected>;

export const PageQuery = z.object({
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
});
/** A cursor page: `total` counts the filtered rows. */
export const pageOf = <T extends z.ZodType>(row: T) =>
  z.object({ rows: z.array(row), nextCursor: z.string().nullable(), total: z.int() });

/** How an account shows to others; `label` is 'you', 'theorist 2', 'review' or a name for admins. */
export const Person = z.object({ id: Id, label: z.string() });
export type Person = z.infer<typeof Person>;

export const When = z.enum(['now', 'tonight']);
