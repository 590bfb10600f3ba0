// Node cannot read TypeScript by itself, and a thread does not inherit the loader of every process that starts it
// (a test runner has its own), so a thread brings the loader along.
import { register } from 'tsx/esm/api'

register()
await import('./thread.ts')
