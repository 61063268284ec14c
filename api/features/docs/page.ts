/** The readable page of the API description: plain HTML and CSS, without a script. */
import { problemTable } from '../../http/problems.ts';
import { apiWords } from '../../words/api-description.ts';
import { fieldsOf, type JsonSchema, typeText } from './schema-text.ts';

const words = apiWords.page;

interface Parameter {
  name: string;
  in: string;
  required?: boolean;
  schema?: JsonSchema;
}
type Content = Record<string, { schema?: JsonSchema }>;
export interface Operation {
  summary?: string;
  tags?: string[];
  'x-roles'?: readonly string[];
  parameters?: Parameter[];
  requestBody?: { content: Content };
  responses: Record<string, { description?: string; content?: Content }>;
}
export type Paths = Record<string, Record<string, Operation>>;

const safe = (text: string): string =>
  text.replace(
    /[&<>"]/g,
    (sign) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[sign] ?? sign,
  );

const slug = (text: string): string => text.replace(/[^a-z0-9]+/gi, '-').replace(/^-|-$/g, '');

export function docsPage(paths: Paths): string {
  const operations = Object.entries(paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
  );
  const nouns = [...new Set(operations.map(({ operation }) => operation.tags?.[0] ?? ''))].sort();
  const sections = nouns.map((noun) => {
    const own = operations.filter(({ operation }) => operation.tags?.[0] === noun);
    return `<section aria-labelledby="noun-${slug(noun)}"><h2 id="noun-${slug(noun)}">${safe(noun)}</h2>${own
      .map(({ path, method, operation }) => operationHtml(path, method, operation))
      .join('')}</section>`;
  });
  const contents = nouns
    .map((noun) => `<li><a href="#noun-${slug(noun)}">${safe(noun)}</a></li>`)
    .join('');
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${safe(apiWords.title)}</title><style>${STYLE}</style></head><body><main>
<h1>${safe(apiWords.title)}</h1><p>${safe(apiWords.description)}</p>
<p><a href="/api/openapi.json">${safe(words.document)}</a></p>
<nav aria-label="${safe(words.contents)}"><ul>${contents}<li><a href="#problems">${safe(words.problems)}</a></li></ul></nav>
${sections.join('\n')}
<section aria-labelledby="problems"><h2 id="problems">${safe(words.problems)}</h2>${problemsHtml()}</section>
</main></body></html>`;
}

function operationHtml(path: string, method: string, operation: Operation): string {
  const who = (operation['x-roles'] ?? []).map((role) => words.whoWords[role] ?? role).join(', ');
  const id = slug(`${method}-${path}`);
  return `<article aria-labelledby="${id}"><h3 id="${id}"><b>${method.toUpperCase()}</b> ${safe(path)}</h3>
<p>${safe(operation.summary ?? '')}</p><p class="who">${safe(words.who)}: ${safe(who)}</p>
${entriesHtml(operation)}${answersHtml(operation)}</article>`;
}

function entriesHtml(operation: Operation): string {
  const rows = (operation.parameters ?? []).map((entry) => [
    entry.name,
    entry.in,
    typeText(entry.schema) + (entry.required ? '' : `, ${words.optional}`),
  ]);
  for (const [type, { schema }] of Object.entries(operation.requestBody?.content ?? {})) {
    for (const field of fieldsOf(schema)) {
      rows.push([field.name, type, field.type + (field.required ? '' : `, ${words.optional}`)]);
    }
  }
  if (rows.length === 0) return '';
  return table(words.entries, [words.field, words.where, words.type], rows);
}

function answersHtml(operation: Operation): string {
  const rows = Object.entries(operation.responses)
    .filter(([status]) => status !== 'default')
    .flatMap(([status, { content }]) => {
      const [type, held] = Object.entries(content ?? {})[0] ?? [];
      if (!type) return [[status, '', words.none]];
      const fields = fieldsOf(held?.schema);
      return fields.length > 0
        ? fields.map((field) => [status, field.name, field.type])
        : [[status, '', type === 'application/json' ? typeText(held?.schema) : type]];
    });
  return table(words.answer, [words.status, words.field, words.type], rows);
}

function problemsHtml(): string {
  const rows = Object.entries(problemTable).map(
    ([code, { status, detail }]) =>
      `<tr id="problem-${code}"><td><code>${code}</code></td><td>${status}</td><td>${safe(detail)}</td></tr>`,
  );
  return `<div class="wide" tabindex="0" role="region" aria-label="${safe(words.problems)}"><table><thead><tr>${[
    words.code,
    words.status,
    words.sentence,
  ]
    .map((name) => `<th scope="col">${safe(name)}</th>`)
    .join('')}</tr></thead><tbody>${rows.join('')}</tbody></table></div>`;
}

function table(caption: string, heads: readonly string[], rows: readonly string[][]): string {
  const head = heads.map((name) => `<th scope="col">${safe(name)}</th>`).join('');
  const body = rows
    .map((cells) => `<tr>${cells.map((cell) => `<td>${safe(cell)}</td>`).join('')}</tr>`)
    .join('');
  return `<table><caption>${safe(caption)}</caption><thead><tr>${head}</tr></thead><tbody>${body}</tbody></table>`;
}

const STYLE = `
:root{color-scheme:light dark;--surface:oklch(0.985 0.006 190);--ink:oklch(0.24 0.03 225);--faded:oklch(0.48 0.025 220);--line:oklch(0.88 0.015 200);--kelp:oklch(0.47 0.08 175)}
@media (prefers-color-scheme:dark){:root{--surface:oklch(0.19 0.018 215);--ink:oklch(0.94 0.01 200);--faded:oklch(0.72 0.02 205);--line:oklch(0.36 0.02 215);--kelp:oklch(0.76 0.11 175)}}
body{margin:0;background:var(--surface);color:var(--ink);font:15px/1.45 system-ui,sans-serif}
main{max-width:1000px;margin:0 auto;padding:40px 24px}
h1{font-size:28px}h2{font-size:21px;margin-top:64px;border-bottom:1px solid var(--line)}
h3{font:600 15px/1.45 ui-monospace,monospace;margin:40px 0 8px;overflow-wrap:anywhere}
p{max-width:72ch;margin:8px 0}.who{color:var(--faded)}a{color:var(--kelp)}
nav ul{display:flex;flex-wrap:wrap;gap:4px 16px;padding:0;list-style:none}
table{border-collapse:collapse;width:100%;margin:12px 0}caption{text-align:left;font-weight:600;padding:4px 0}
th,td{text-align:left;vertical-align:top;padding:4px 16px 4px 0;border-top:1px solid var(--line);overflow-wrap:anywhere}
th{color:var(--faded);font-weight:400;white-space:nowrap}.wide{overflow-x:auto}
:focus-visible{outline:2px solid var(--ink);outline-offset:2px}`;
