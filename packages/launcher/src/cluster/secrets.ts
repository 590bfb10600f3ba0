import { randomBytes } from 'node:crypto'
import { readFile, rename, writeFile } from 'node:fs/promises'

import { hasCode } from '../error-code.ts'

/**
 * The secret kept in `path` (readable by its owner only); made at the first call and the same ever after.
 */
export async function keepSecret(path: string): Promise<string> {
  try {
    const kept = (await readFile(path, 'utf8')).trim()
    if (kept.length >= 32) return kept
  } catch (error) {
    if (!hasCode(error, 'ENOENT')) throw error
  }
  const secret = randomBytes(32).toString('hex')
  await writeFile(`${path}.new`, `${secret}\n`, { mode: 0o600 })
  await rename(`${path}.new`, path)
  return secret
}
