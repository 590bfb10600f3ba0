import { readFile } from 'node:fs/promises'

/** A process number alone is reused by the system; with its start time it names one process for good. */
export type ProcessIdentity = { readonly pid: number; readonly startTicks: string }

export async function ownIdentity(): Promise<ProcessIdentity> {
  const startTicks = await readStartTicks(process.pid)
  if (startTicks === undefined) throw new Error('This system has no /proc; Fieldfare needs Linux.')
  return { pid: process.pid, startTicks }
}

export async function isRunning(identity: ProcessIdentity): Promise<boolean> {
  return (await readStartTicks(identity.pid)) === identity.startTicks
}

export async function readCommandLine(pid: number): Promise<readonly string[]> {
  const text = await readFileIfPresent(`/proc/${pid}/cmdline`)
  return text === undefined ? [] : text.split('\0')
}

/** Undefined when no such process lives; one that has ended and waits to be collected counts as not living. */
export async function readStartTicks(pid: number): Promise<string | undefined> {
  const text = await readFileIfPresent(`/proc/${pid}/stat`)
  // The second field is the program's name in brackets and may itself hold blanks and brackets (proc(5)).
  const fields = text?.slice(text.lastIndexOf(')') + 2).split(' ')
  return fields === undefined || fields[0] === 'Z' ? undefined : fields[19]
}

async function readFileIfPresent(path: string): Promise<string | undefined> {
  try {
    return await readFile(path, 'utf8')
  } catch {
    // The process ended, or never was: for every caller the same answer.
    return undefined
  }
}
