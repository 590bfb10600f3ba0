import { parseArgs } from 'node:util'
import { ScanInputError } from './scan-input-error.ts'

export type ScanArguments = {
  readonly catalogue: string
  readonly logs: string
  readonly out: string
}

export const USAGE =
  'usage: npm run -s scan -- --catalogue DIR/catalogue.csv --logs DIR/logs --out detections.json'

/** Reads the command line. @throws ScanInputError when something is missing or unknown. */
export function readScanArguments(argv: readonly string[]): ScanArguments {
  const text = { type: 'string' } as const
  const parsed = (() => {
    try {
      return parseArgs({ args: [...argv], options: { catalogue: text, logs: text, out: text } }).values
    } catch (error) {
      const reason = error instanceof Error ? error.message : String(error)
      throw new ScanInputError(`${reason.split('\n')[0] ?? ''} (${USAGE})`)
    }
  })()
  const { catalogue, logs, out } = parsed
  if (!catalogue || !logs || !out) throw new ScanInputError(USAGE)
  return { catalogue, logs, out }
}
