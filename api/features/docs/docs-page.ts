import type { Who } from '../../contract/operation.ts';
import type { OpenApiDocument, OpenApiOperation, OpenApiParameter } from '../../contract/openapi.ts';
import { schemaWords } from './schema-words.ts';

const WHO: Record<Who, string> = {
  anyone: 'anyone',
  staff: 'owner and assistants of the studio',
  owner: 'owner of the studio',
  guest: 'any guest',
  looker: 'guests of the sheet, and whoever looks at it by its open link',
  'guest-of-sheet': 'guests of the sheet',
  lead: 'lead of the sheet',
  recipient: 'recipients of the delivery',
};

/** Makes text safe to stand within HTML, in attributes too. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

const anchor = (name: string) => name.replace(/\W+/g, '-').toLowerCase();

/** The description of the API as one page of HTML, without scripts and without anything from elsewhere. */
export function docsPage(document: OpenApiDocument): string {
  const operations = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
  );
  const tags = document.tags.filter(({ name }) => operations.some(({ operation }) => operation.tags.includes(name)));
  const section = (name: string) => {
    const rows = operations.filter(({ operation }) => operation.tags.includes(name));
    return `<section id="${anchor(name)}"><h2>${escapeHtml(name)}</h2>${rows.map(operationRow).join('')}</section>`;
  };
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>The API · ${escapeHtml(document.info.title)}</title><style>${STYLE}</style></head>
<body><main><h1>The API of Oriel</h1>
<p>${operations.length} operations. For programs the same stands in <a href="/api/openapi.json">openapi.json</a> (OpenAPI ${document.openapi}).</p>
${RULES}
<nav aria-label="Nouns"><ul>${tags.map(({ name }) => `<li><a href="#${anchor(name)}">${escapeHtml(name)}</a></li>`).join('')}</ul></nav>
${tags.map(({ name }) => section(name)).join('\n')}
<section id="schemas"><h2>Schemas</h2>${Object.entries(document.components.schemas).map(schemaRow).join('')}</section>
</main></body></html>`;
}

function operationRow({ path, method, operation }: { path: string; method: string; operation: OpenApiOperation }): string {
  const body = Object.entries(operation.requestBody?.content ?? {})[0];
  const [status, answer] = Object.entries(operation.responses)[0] ?? ['200', {}];
  const sent = Object.entries(answer.content ?? {})[0];
  return `<details id="${operation.operationId}"><summary><code><b>${method.toUpperCase()}</b> ${escapeHtml(path)}</code>
<span>${escapeHtml(operation.summary)}</span><em>${WHO[operation['x-who']]}</em></summary><dl>
${operation.parameters.map(parameterRow).join('')}
${body ? `<dt>Send</dt><dd>${escapeHtml(body[0])}: ${schemaWords(body[1].schema)}</dd>` : ''}
<dt>Answer</dt><dd>${status}${sent ? `, ${escapeHtml(sent[0])}: ${schemaWords(sent[1].schema)}` : ', without content'}</dd></dl></details>`;
}

function parameterRow({ name, in: place, required, schema, description = '' }: OpenApiParameter): string {
  const where = place === 'path' ? 'in the address' : place === 'header' ? 'header' : `query${required ? '' : ', may be left out'}`;
  return `<dt><code>${escapeHtml(name)}</code></dt><dd>${where}: ${schemaWords(schema)} ${escapeHtml(description)}</dd>`;
}

function schemaRow([name, schema]: [string, object]): string {
  return `<details id="schema-${name}"><summary><code><b>${name}</b></code></summary><div class="schema">${schemaWords(schema, true)}</div></details>`;
}

const RULES = `<p>A person of a studio has the cookie <code>oriel_studio</code>, a guest <code>oriel_guest</code>. Requests that change something
are refused when they come from another website. Whatever goes wrong is answered as <code>application/problem+json</code> (RFC 9457). Lists take
<code>limit</code> and <code>after</code>, and give the next cursor as <code>next</code>. Rows with a <code>version</code> are changed with
<code>If-Match</code>; a stale version is answered with 412. A field left out means “leave”, null means “clear”.</p>`;

const STYLE = `
body{margin:0;background:#f4f4f4;color:#161616;font:15px/22px Lato,system-ui,sans-serif}
main{max-width:1100px;margin:0 auto;padding:24px 16px 64px}
h1{font-size:30px;line-height:36px;margin:0 0 8px}h2{font-size:17px;margin:0;padding:12px 14px;border-bottom:1px solid #161616}
p{max-width:80ch}a{color:inherit}section{background:#fff;border:1px solid #161616;margin-top:24px}
nav ul{display:flex;flex-wrap:wrap;gap:4px 16px;padding:0;list-style:none}nav a{display:inline-block;padding:4px 0}
details{border-top:1px solid #dedede}h2+details{border-top:0}
summary{display:flex;flex-wrap:wrap;gap:2px 16px;padding:8px 14px;cursor:pointer}summary:hover{background:#f4f4f4}
summary code{flex:1 1 420px;overflow-wrap:anywhere}summary span{flex:1 1 260px}summary em{flex:0 1 240px;color:#5c5c5c;font-style:normal;font-size:13px}
code{font:13px/20px ui-monospace,monospace}:focus-visible{outline:2px solid #161616;outline-offset:2px}
dl{display:grid;grid-template-columns:minmax(120px,auto) 1fr;gap:4px 16px;margin:0;padding:4px 14px 14px}dt{color:#5c5c5c}dd{margin:0;overflow-wrap:anywhere}
.schema{padding:4px 14px 14px}ul.fields{margin:0;padding-left:18px}`;
