import { spawn } from 'node:child_process'
import { open, readFile, rename, stat } from 'node:fs/promises'

import type { SystemUser } from './system-user.ts'

export type ProcessOptions = {
  /** How messages call it: "worker". */
  readonly name: string
  readonly command: string
  readonly commandArguments: readonly string[]
  readonly environment?: NodeJS.ProcessEnv
  readonly directory?: string
  /** Standard output and standard error are appended here. */
  readonly logFile: string
  /** Run as this user instead of the present one (only root can). */
  readonly user?: SystemUser
  /** What the process is sent when this one dies without saying good-bye. */
  readonly deathSignal?: 'SIGTERM' | 'SIGINT'
}

export type Exit = { readonly code: number | null; readonly signal: NodeJS.Signals | null }

export type RunningProcess = {
  readonly name: string
  readonly pid: number
  readonly logFile: string
  readonly exited: Promise<Exit>
  readonly hasExited: () => boolean
  /** Sends `signal`, then after `graceMs` kills; resolves once the process is gone. */
  readonly stop: (signal: NodeJS.Signals, graceMs: number) => Promise<void>
}

const MAXIMUM_LOG_BYTES = 8 * 1024 * 1024

/**
 * Starts a process in a session of its own, so that Ctrl-C in the terminal reaches only the launcher, which then ends
 * its processes in order; the kernel ends them when the launcher is killed.
 */
export async function startProcess(options: ProcessOptions): Promise<RunningProcess> {
  await rotateLog(options.logFile)
  const log = await open(options.logFile, 'a', 0o600)
  try {
    const child = spawn(
      'setpriv',
      [...privilegeArguments(options), '--', options.command, ...options.commandArguments],
      {
        cwd: options.directory,
        detached: true,
        env: options.environment ?? process.env,
        stdio: ['ignore', log.fd, log.fd],
      },
    )
    let exit: Exit | undefined
    const exited = new Promise<Exit>((resolve) => {
      child.once('exit', (code, signal) => {
        exit = { code, signal }
        resolve(exit)
      })
    })
    await new Promise<void>((resolve, reject) => {
      child.once('spawn', resolve)
      child.once('error', reject)
    })
    const pid = child.pid ?? fail(`${options.name} was started without a process number.`)
    const hasExited = (): boolean => exit !== undefined
    const stop = (signal: NodeJS.Signals, graceMs: number): Promise<void> =>
      stopProcess(pid, { hasExited, exited, signal, graceMs })
    return { name: options.name, pid, logFile: options.logFile, exited, hasExited, stop }
  } finally {
    await log.close()
  }
}

/** The last lines of a log, for a message about its process. */
export async function readLogTail(logFile: string, lineCount = 12): Promise<string> {
  const text = await readFile(logFile, 'utf8').catch(() => '')
  return text.trimEnd().split('\n').slice(-lineCount).join('\n')
}

function privilegeArguments({ user, deathSignal = 'SIGTERM' }: ProcessOptions): readonly string[] {
  const death = ['--pdeathsig', deathSignal.slice('SIG'.length)]
  return user === undefined ? death : [...death, ...user.privilegeArguments]
}

async function stopProcess(
  pid: number,
  {
    hasExited,
    exited,
    signal,
    graceMs,
  }: Pick<RunningProcess, 'hasExited' | 'exited'> & {
    readonly signal: NodeJS.Signals
    readonly graceMs: number
  },
): Promise<void> {
  if (hasExited()) return
  process.kill(pid, signal)
  const killTimer = setTimeout(() => {
    // The process leads its own group: what it started goes with it.
    if (!hasExited()) process.kill(-pid, 'SIGKILL')
  }, graceMs)
  await exited
  clearTimeout(killTimer)
}

async function rotateLog(logFile: string): Promise<void> {
  const size = await stat(logFile).then(
    (entry) => entry.size,
    () => 0,
  )
  if (size > MAXIMUM_LOG_BYTES) await rename(logFile, `${logFile}.1`)
}

function fail(message: string): never {
  throw new Error(message)
}
