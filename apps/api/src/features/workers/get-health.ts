import type { endpoints } from '@nightcone/contracts';
import type { Handler } from '../../context.ts';

/** The process answers; it says nothing of what it needs. */
export const getHealth: Handler<typeof endpoints.getHealth> = async () => ({ ok: true });
