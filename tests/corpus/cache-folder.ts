import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'

/** A folder that outlives test runs: downloads and decoded audio. FIELDFARE_CACHE_DIR moves it. */
export async function cacheFolder(...parts: string[]): Promise<string> {
  const root = process.env['FIELDFARE_CACHE_DIR'] ?? join(import.meta.dirname, '../../.cache')
  const folder = join(root, ...parts)
  await mkdir(folder, { recursive: true })
  return folder
}
