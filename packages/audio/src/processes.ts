import { spawn, type ChildProcessByStdio } from 'node:child_process'
import { once } from 'node:events'
import type { Readable, Writable } from 'node:stream'
import { decoderMissing } from './audio-error.ts'

const KEPT_STDERR_CHARACTERS = 4000

/** A program that was started, and how it ended. */
export type RunningProgram = {
  readonly child: ChildProcessByStdio<Writable, Readable, Readable>
  /** Settles when the program ended and its output is closed; never rejects. `code` is null after a signal. */
  readonly ended: Promise<{ code: number | null; stderr: string; missing: boolean }>
}

/**
 * Starts a program without a shell. The child is killed when `signal` aborts. Its last words on stderr are kept,
 * bounded, for error messages.
 */
export function startProgram(program: string, args: readonly string[], signal?: AbortSignal): RunningProgram {
  const child = spawn(program, args, { stdio: ['pipe', 'pipe', 'pipe'] })
  let stderr = ''
  let missing = false
  child.stderr.setEncoding('utf8')
  child.stderr.on('data', (text: string) => {
    stderr = (stderr + text).slice(-KEPT_STDERR_CHARACTERS)
  })
  // A child that ends early closes its input; what it did not read is of no interest.
  child.stdin.on('error', () => undefined)
  const kill = () => void child.kill('SIGKILL')
  if (signal?.aborted) kill()
  signal?.addEventListener('abort', kill, { once: true })
  const ended = new Promise<{ code: number | null; stderr: string; missing: boolean }>((resolve) => {
    let isSettled = false
    const settle = (code: number | null) => {
      if (isSettled) return
      isSettled = true
      signal?.removeEventListener('abort', kill)
      resolve({ code, stderr: stderr.trim(), missing })
    }
    child.on('error', (error: NodeJS.ErrnoException) => {
      missing = error.code === 'ENOENT'
      stderr = error.message
      if (child.pid === undefined) settle(null)
    })
    child.on('close', (code) => settle(code))
  })
  return { child, ended }
}

/** Runs a program to its end and returns what it wrote, at most `maximumBytes`. @throws AudioError `decoder-missing`. */
export async function runProgram(
  program: string,
  args: readonly string[],
  { maximumBytes = 64 * 1024 * 1024, signal, input }: RunOptions = {},
): Promise<{ code: number | null; stdout: Buffer; stderr: string }> {
  const { child, ended } = startProgram(program, args, signal)
  child.stdin.end(input ?? '')
  const parts: Buffer[] = []
  let bytes = 0
  child.stdout.on('data', (part: Buffer) => {
    bytes += part.length
    if (bytes > maximumBytes) child.kill('SIGKILL')
    else parts.push(part)
  })
  const { code, stderr, missing } = await ended
  signal?.throwIfAborted()
  if (missing) throw decoderMissing(program)
  return { code, stdout: Buffer.concat(parts), stderr }
}

type RunOptions = { maximumBytes?: number; signal?: AbortSignal; input?: string | Uint8Array }

/** Writes to a child's input and waits while it is full. Returns false when the child no longer listens. */
export async function writeToChild(stdin: Writable, bytes: Uint8Array): Promise<boolean> {
  if (stdin.destroyed || stdin.writableEnded) return false
  if (stdin.write(bytes)) return true
  const waiting = new AbortController()
  const isGone = once(stdin, 'close', { signal: waiting.signal }).then(() => false)
  const isDrained = once(stdin, 'drain', { signal: waiting.signal }).then(() => true)
  const outcome = await Promise.race([isDrained, isGone]).catch(() => false)
  waiting.abort()
  await Promise.allSettled([isGone, isDrained])
  return outcome
}
