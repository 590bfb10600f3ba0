import { z } from 'zod'

/** The parts of an OpenAPI document that the page shows. */
const schemaSchema = z.looseObject({})
const operationSchema = z.object({
  operationId: z.string(),
  tags: z.array(z.string()).min(1),
  summary: z.string(),
  description: z.string(),
  parameters: z.array(
    z.object({ name: z.string(), in: z.string(), required: z.boolean(), schema: schemaSchema.optional() }),
  ),
  requestBody: z
    .object({ content: z.record(z.string(), z.object({ schema: schemaSchema.optional() })) })
    .optional(),
  responses: z.record(
    z.string(),
    z.object({
      description: z.string(),
      content: z.record(z.string(), z.object({ schema: schemaSchema.optional() })).optional(),
    }),
  ),
})
const documentSchema = z.object({
  info: z.object({ title: z.string(), version: z.string(), description: z.string() }),
  paths: z.record(z.string(), z.record(z.string(), operationSchema)),
})

type Operation = z.infer<typeof operationSchema>
type PlacedOperation = Operation & { path: string; method: string }

const ESCAPES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}

export function escapeHtml(text: string): string {
  return text.replaceAll(/[&<>"']/g, (character) => ESCAPES[character] ?? character)
}

function renderSchema(title: string, schema: unknown): string {
  if (schema === undefined) return ''
  const json = escapeHtml(JSON.stringify(schema, null, 2))
  return `<details><summary>${escapeHtml(title)}</summary><pre><code>${json}</code></pre></details>`
}

function renderContents(title: string, content: Record<string, { schema?: unknown }> | undefined): string {
  return Object.entries(content ?? {})
    .map(([mediaType, { schema }]) =>
      schema === undefined
        ? `<p>${escapeHtml(title)}: ${escapeHtml(mediaType)}</p>`
        : renderSchema(`${title}: ${mediaType}`, schema),
    )
    .join('')
}

function renderParameters(operation: Operation): string {
  if (operation.parameters.length === 0) return ''
  const rows = operation.parameters.map(
    ({ name, in: place, required, schema }) =>
      `<tr><th scope="row"><code>${escapeHtml(name)}</code></th><td>${escapeHtml(place)}</td><td>${required ? 'yes' : 'no'}</td><td><code>${escapeHtml(JSON.stringify(schema ?? {}))}</code></td></tr>`,
  )
  return `<div class="wide"><table><thead><tr><th scope="col">Parameter</th><th scope="col">In</th><th scope="col">Needed</th><th scope="col">Form</th></tr></thead><tbody>${rows.join('')}</tbody></table></div>`
}

function renderOperation(operation: PlacedOperation): string {
  const success = operation.responses['200']
  return `<article id="${escapeHtml(operation.operationId)}">
<h3><span class="method">${escapeHtml(operation.method)}</span> <code>${escapeHtml(operation.path)}</code></h3>
<p>${escapeHtml(operation.summary)}. ${escapeHtml(operation.description)}</p>
${renderParameters(operation)}${renderContents('Request', operation.requestBody?.content)}${renderContents('Answer', success?.content)}
${success === undefined ? '<p>Answers 204 without content.</p>' : ''}</article>`
}

function groupByTag(paths: z.infer<typeof documentSchema>['paths']): Map<string, PlacedOperation[]> {
  const groups = new Map<string, PlacedOperation[]>()
  for (const [path, operations] of Object.entries(paths)) {
    for (const [method, operation] of Object.entries(operations)) {
      const [tag = 'Other'] = operation.tags
      const group = groups.get(tag) ?? []
      group.push({ ...operation, path, method: method.toUpperCase() })
      groups.set(tag, group)
    }
  }
  return groups
}

const anchor = (tag: string) => tag.toLowerCase().replaceAll(/[^a-z]+/g, '-')

/** The interface as one plain page: made here, without scripts, from the same document that programs read. */
export function renderDocumentationPage(document: unknown, stylesheetPath: string): string {
  const { info, paths } = documentSchema.parse(document)
  const groups = [...groupByTag(paths)]
  const contents = groups.map(([tag]) => `<li><a href="#${anchor(tag)}">${escapeHtml(tag)}</a></li>`).join('')
  const sections = groups.map(
    ([tag, operations]) =>
      `<section aria-labelledby="${anchor(tag)}"><h2 id="${anchor(tag)}">${escapeHtml(tag)}</h2>${operations.map(renderOperation).join('')}</section>`,
  )
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(info.title)} interface</title>
<link rel="stylesheet" href="${stylesheetPath}">
</head>
<body>
<header><h1>${escapeHtml(info.title)} interface</h1>
<p>Version ${escapeHtml(info.version)}. ${escapeHtml(info.description)}</p>
<p>Programs read the same as <a href="/api/openapi.json">an OpenAPI document</a>. Every failure is a problem document (RFC 9457).</p></header>
<nav aria-label="Contents"><ul>${contents}</ul></nav>
<main>${sections.join('')}</main>
</body>
</html>
`
}
