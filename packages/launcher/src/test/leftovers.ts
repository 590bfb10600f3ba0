import { randomUUID } from 'node:crypto'
import { readdir, readFile } from 'node:fs/promises'

/**
 * Every process a test run starts inherits this variable, so that those it forgot to end are recognised for certain.
 */
export const RUN_MARKER = 'FIELDFARE_TEST_RUN'

export function makeRunMarker(): string {
  return randomUUID()
}

/** Ends what the run left behind and returns the command lines; empty is as it should be. */
export async function endLeftovers(marker: string): Promise<readonly string[]> {
  const ended: string[] = []
  for (const entry of await readdir('/proc')) {
    const pid = Number(entry)
    if (!Number.isInteger(pid) || pid === process.pid) continue
    const environment = await readProcFile(pid, 'environ')
    if (!environment.split('\0').includes(`${RUN_MARKER}=${marker}`)) continue
    ended.push((await readProcFile(pid, 'cmdline')).replaceAll('\0', ' ').trim())
    try {
      process.kill(pid, 'SIGKILL')
    } catch {
      // It ended by itself between the look and the signal.
    }
  }
  return ended
}

async function readProcFile(pid: number, name: 'environ' | 'cmdline'): Promise<string> {
  // Empty for processes that ended meanwhile and for those of other users.
  return readFile(`/proc/${pid}/${name}`, 'utf8').catch(() => '')
}
