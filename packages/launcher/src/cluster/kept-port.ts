import { readFile, writeFile } from 'node:fs/promises'

import { findFreePort, isPortFree } from '../ports.ts'

/** The port remembered in `path`, or a new free one when there is none or somebody else took it. */
export async function keepPort(path: string): Promise<number> {
  const remembered = Number(await readFile(path, 'utf8').catch(() => ''))
  if (Number.isInteger(remembered) && remembered > 1023 && (await isPortFree(remembered))) return remembered
  const port = await findFreePort()
  await writeFile(path, `${port}\n`)
  return port
}
