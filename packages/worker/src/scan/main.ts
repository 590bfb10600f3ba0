import { writeFile } from 'node:fs/promises'
import { readCatalogueFile } from './catalogue-file.ts'
import { readScanArguments } from './scan-arguments.ts'
import { ScanInputError } from './scan-input-error.ts'
import { scanLogs } from './scan.ts'

const EXIT_BAD_INPUT = 2

async function main(): Promise<void> {
  const { catalogue, logs, out } = readScanArguments(process.argv.slice(2))
  const rows = await readCatalogueFile(catalogue)
  const report = await scanLogs(rows, logs, (line) => console.error(line))
  await writeFile(out, `${JSON.stringify(report, null, 2)}\n`).catch(() => {
    throw new ScanInputError(`${out}: cannot be written`)
  })
}

try {
  await main()
} catch (error) {
  if (!(error instanceof ScanInputError)) throw error
  console.error(error.message)
  process.exitCode = EXIT_BAD_INPUT
}
