import type { endpoints } from '@nightcone/contracts';
import { findOptionalCurrentKernel, findSettings } from '@nightcone/db';
import type { Handler } from '../../context.ts';

export const getSession: Handler<typeof endpoints.getSession> = async ({ ctx }) => {
  const { db } = ctx.services;
  const [settings, kernel] = await Promise.all([findSettings(db), findOptionalCurrentKernel(db)]);
  return {
    account: ctx.caller?.account ?? null,
    group: {
      name: settings.groupName,
      timeZone: settings.timeZone,
      nightFrom: settings.nightFrom.slice(0, 5),
      nightTo: settings.nightTo.slice(0, 5),
    },
    kernel: kernel ? { digest: kernel.digest, version: kernel.version } : null,
  };
};
