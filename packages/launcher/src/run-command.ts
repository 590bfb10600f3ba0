import { spawn } from 'node:child_process'
import { createInterface } from 'node:readline'

export type CommandOptions = {
  /** How messages call it: "vite build". */
  readonly name: string
  readonly command: string
  readonly commandArguments: readonly string[]
  readonly directory: string
  readonly environment?: NodeJS.ProcessEnv
  /** Ends the command, with all it started, when aborted. */
  readonly signal: AbortSignal
  /** Called for each line of standard output and standard error. */
  readonly onLine?: (line: string) => void
}

export class CommandError extends Error {
  override readonly name = 'CommandError'
  /** The last lines it printed. */
  readonly tail: string

  constructor(message: string, tail: string) {
    super(message)
    this.tail = tail
  }
}

const TAIL_LINES = 25
const GRACE_MS = 5_000

/**
 * Runs a command to its end, passing on its output line by line.
 *
 * @throws {@link CommandError} when it ends with anything but 0, or was aborted
 */
export async function runCommand(options: CommandOptions): Promise<void> {
  options.signal.throwIfAborted()
  const lines: string[] = []
  const child = spawn(
    'setpriv',
    ['--pdeathsig', 'TERM', '--', options.command, ...options.commandArguments],
    {
      cwd: options.directory,
      detached: true,
      env: options.environment ?? process.env,
      stdio: ['ignore', 'pipe', 'pipe'],
    },
  )
  for (const stream of [child.stdout, child.stderr]) {
    createInterface({ input: stream }).on('line', (line) => {
      lines.push(line)
      if (lines.length > TAIL_LINES) lines.shift()
      options.onLine?.(line)
    })
  }
  const end = (): void => endGroup(child.pid)
  options.signal.addEventListener('abort', end, { once: true })
  try {
    const outcome = await new Promise<string | undefined>((resolve, reject) => {
      child.once('error', reject)
      // "close" rather than "exit": by then all output has been read.
      child.once('close', (code, signal) => resolve(code === 0 ? undefined : describeEnd(code, signal)))
    })
    options.signal.throwIfAborted()
    if (outcome !== undefined) throw new CommandError(`${options.name} ${outcome}`, lines.join('\n'))
  } finally {
    options.signal.removeEventListener('abort', end)
  }
}

function describeEnd(code: number | null, signal: NodeJS.Signals | null): string {
  return signal === null ? `ended with ${code ?? 'no'} code` : `was ended by ${signal}`
}

/** The command leads a process group of its own, so what it started goes with it. */
function endGroup(pid: number | undefined): void {
  if (pid === undefined) return
  signalGroup(pid, 'SIGTERM')
  setTimeout(() => signalGroup(pid, 'SIGKILL'), GRACE_MS).unref()
}

function signalGroup(pid: number, signal: NodeJS.Signals): void {
  try {
    process.kill(-pid, signal)
  } catch {
    // The whole group has ended already.
  }
}
