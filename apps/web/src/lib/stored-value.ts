import { useState } from 'react'
import type { z } from 'zod'

function read<Schema extends z.ZodType>(
  key: string,
  schema: Schema,
  fallback: z.output<Schema>,
): z.output<Schema> {
  const text = localStorage.getItem(key)
  if (text === null) return fallback
  try {
    const reading = schema.safeParse(JSON.parse(text))
    return reading.success ? reading.data : fallback
  } catch {
    // Somebody else's text under our key is worth no more than nothing.
    return fallback
  }
}

/** State remembered by this browser under a key, checked when read back. */
export function useStoredValue<Schema extends z.ZodType>(
  key: string,
  schema: Schema,
  fallback: z.output<Schema>,
): [z.output<Schema>, (value: z.output<Schema>) => void] {
  const [value, setValue] = useState(() => read(key, schema, fallback))
  return [
    value,
    (next) => {
      setValue(next)
      localStorage.setItem(key, JSON.stringify(next))
    },
  ]
}
