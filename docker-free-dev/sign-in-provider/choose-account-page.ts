import { demoAccounts } from './demo-accounts.ts';

const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (char) => `&#${char.charCodeAt(0)};`);

/** A list of names and nothing else: it stands in for a provider and must not look like one. */
export function chooseAccountPage(query: URLSearchParams): string {
  const link = (extra: Record<string, string>) => {
    const target = new URLSearchParams(query);
    for (const [name, value] of Object.entries(extra)) target.set(name, value);
    return escapeHtml(`/login/oauth/authorize?${target}`);
  };
  const rows = demoAccounts.map(
    ({ login, name, role, unknown }) =>
      `<li><a href="${link({ account: login })}">${escapeHtml(login)}</a> ${escapeHtml(name)}, ${unknown ? 'not admitted yet' : role}</li>`,
  );
  return `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<title>Choose a demo account</title>
<style>body { font: 1rem/1.6 system-ui, sans-serif; max-width: 34rem; margin: 3rem auto; padding: 0 1rem } li { margin: .5rem 0 }</style>
<main>
<h1>Choose a demo account</h1>
<p>This page stands in for the sign-in provider on this machine. There is no password.</p>
<ul>
${rows.join('\n')}
</ul>
<p><a href="${link({ refuse: '1' })}">Go back without signing in</a></p>
</main>
</html>
`;
}
