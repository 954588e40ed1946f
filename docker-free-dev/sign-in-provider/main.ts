import { startProvider } from './start-provider.ts';

/** Starts the stand-in on a free port (or NIGHTCONE_PROVIDER_PORT) and prints its address. */
const { NIGHTCONE_GITHUB_CLIENT_ID: clientId, NIGHTCONE_GITHUB_CLIENT_SECRET: clientSecret } = process.env;
if (!clientId || !clientSecret) {
  console.error('Set NIGHTCONE_GITHUB_CLIENT_ID and NIGHTCONE_GITHUB_CLIENT_SECRET, the same as for the API.');
  process.exit(2);
}
const provider = await startProvider({
  clientId,
  clientSecret,
  port: Number(process.env.NIGHTCONE_PROVIDER_PORT ?? 0),
});
console.log(provider.url);
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void provider.close());
