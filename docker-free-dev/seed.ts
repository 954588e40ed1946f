// The demo group: an invented institute, and the demo accounts admitted, so that each role can sign in. Repeatable.
import { admitDemoAccounts, createDb, createPool, findSettings, saveSettings } from '@nightcone/db';
import { demoAccounts } from './sign-in-provider/demo-accounts.ts';

const groupName = 'Institute of Thin Crystals, theory group';

const url = process.env.NIGHTCONE_DATABASE_URL;
if (!url) throw new Error('Set NIGHTCONE_DATABASE_URL.');
const pool = createPool(url, { max: 1 });
try {
  const db = createDb(pool);
  await admitDemoAccounts(
    db,
    demoAccounts.filter((account) => !account.unknown),
  );
  // settings are versioned: a second start adds no version
  const { version, groupName: present } = await findSettings(db);
  if (version === 1 && present !== groupName)
    await saveSettings(db, { accountId: null, requestId: null }, { groupName });
} finally {
  await pool.end();
}
