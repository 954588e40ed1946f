import { type Endpoint, endpoints } from '@nightcone/contracts';

const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (char) => `&#${char.charCodeAt(0)};`);

/** Colours of the paper and night themes; a page of text that needs no script and no font file. */
const style = `
:root { color-scheme: light dark; --ground: oklch(98.2% 0.008 90); --ink: oklch(24% 0.02 270); --line: oklch(87% 0.012 90) }
@media (prefers-color-scheme: dark) { :root { --ground: oklch(19% 0.025 275); --ink: oklch(92% 0.012 90); --line: oklch(34% 0.03 275) } }
body { background: var(--ground); color: var(--ink); font: 1rem/1.55 system-ui, sans-serif; max-width: 60rem; margin: 2rem auto; padding: 0 1rem }
h1, h2 { font-weight: 600; line-height: 1.2 } h2 { margin-top: 2.5rem }
a { color: inherit } code, pre { font: .9em/1.5 ui-monospace, monospace }
article { border-top: 1px solid var(--line); padding: .8rem 0 } article h3 { font-size: 1rem; margin: 0 }
article p { margin: .2rem 0 } pre { overflow-x: auto; border-left: 3px solid var(--line); padding-left: 1rem }
summary { cursor: pointer; min-height: 24px } :focus-visible { outline: 2px solid var(--ink); outline-offset: 2px }
`;

interface Operation {
  description: string;
  parameters: { name: string; in: string; required: boolean; schema: object }[];
  requestBody?: { content: Record<string, { schema: object }> };
  responses: Record<string, { content?: Record<string, { schema?: object }> }>;
}

const json = (value: unknown) => `<pre>${escapeHtml(JSON.stringify(value, null, 2))}</pre>`;
const fold = (title: string, value: unknown) =>
  value === undefined ? '' : `<details><summary>${escapeHtml(title)}</summary>${json(value)}</details>`;

function article(endpoint: Endpoint, operation: Operation): string {
  const status = String(endpoint.status ?? 200);
  const [type, answer] = Object.entries(operation.responses[status]?.content ?? {})[0] ?? [];
  const parameters = operation.parameters.map(({ name, in: place, required }) => {
    return `<code>${escapeHtml(name)}</code> (${place}${required ? '' : ', optional'})`;
  });
  return `<article id="${endpoint.id}">
<h3><code>${endpoint.method.toUpperCase()} /api/v1${escapeHtml(endpoint.path)}</code></h3>
<p>${escapeHtml(endpoint.summary)}. ${escapeHtml(operation.description)}</p>
${parameters.length > 0 ? `<p>Parameters: ${parameters.join(', ')}</p>` : ''}
${fold('Body', operation.requestBody?.content['application/json']?.schema)}
${answer?.schema ? fold(`Answer ${status}`, answer.schema) : `<p>Answer ${status}${type ? `: ${escapeHtml(type)}` : ', empty'}</p>`}
</article>`;
}

/** The OpenAPI description as a page to read. */
export function docsPage(document: Record<string, unknown>): string {
  const paths = document.paths as Record<string, Record<string, Operation>>;
  const groups = new Map<string, string[]>();
  for (const endpoint of Object.values(endpoints) as Endpoint[]) {
    const group = endpoint.path.split('/')[1] ?? '';
    const operation = paths[endpoint.path.replace(/:(\w+)/g, '{$1}')]?.[endpoint.method];
    if (operation) groups.set(group, [...(groups.get(group) ?? []), article(endpoint, operation)]);
  }
  const sections = [...groups].map(
    ([name, articles]) => `<section><h2 id="${name}">${name}</h2>${articles.join('\n')}</section>`,
  );
  const links = [...groups.keys()].map((name) => `<a href="#${name}">${name}</a>`).join(' · ');
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>Nightcone: programming interface</title><style>${style}</style></head>
<body>
<main>
<h1>Nightcone: programming interface</h1>
<p>Machine-readable: <a href="/api/v1/openapi.json">OpenAPI 3.1</a>. Scripts send a personal access token as <code>Authorization: Bearer nct_…</code>;
tokens are made on the account page. A refusal is a problem document (RFC 9457) with a stable <code>code</code>; <code>errors</code> names each field by
JSON Pointer with its value and limit. Submissions take an <code>Idempotency-Key</code>: sent twice, they are done once.</p>
<p>${links}</p>
${sections.join('\n')}
</main>
</body>
</html>
`;
}
