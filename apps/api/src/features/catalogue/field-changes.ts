type Value = string | number | null

function show(value: Value): string {
  return value === null || value === '' ? 'none' : `“${value}”`
}

/** “title “A” → “B”, artist …”: what an update changes, for the audit trail; empty when nothing changes. */
export function describeChanges(fields: readonly { label: string; before: Value; after: Value }[]): string {
  return fields
    .filter(({ before, after }) => before !== after)
    .map(({ label, before, after }) => `${label} ${show(before)} → ${show(after)}`)
    .join(', ')
}
