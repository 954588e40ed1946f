// Admits the demo accounts, so that each role can sign in through the stand-in. Repeatable.
import { admitDemoAccounts, createDb, createPool } from '@nightcone/db';
import { demoAccounts } from './sign-in-provider/demo-accounts.ts';

const url = process.env.NIGHTCONE_DATABASE_URL;
if (!url) throw new Error('Set NIGHTCONE_DATABASE_URL.');
const pool = createPool(url, { max: 1 });
try {
  await admitDemoAccounts(
    createDb(pool),
    demoAccounts.filter((account) => !account.unknown),
  );
} finally {
  await pool.end();
}
