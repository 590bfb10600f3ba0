import { type ChildProcess, spawn } from 'node:child_process'
import { chmod, cp, readdir, readFile, symlink } from 'node:fs/promises'
import { join } from 'node:path'

import { REPOSITORY_DIRECTORY } from '@fieldfare/launcher'

import { atEndOfFile, findFreePort, temporaryDirectory, waitUntil } from '../../support/index.ts'

/** A checkout with the real launcher and stand-ins for everything it starts. */
export type Checkout = {
  readonly dataDirectory: string
  readonly start: () => Promise<StartedInstance>
  /** What the stand-ins noted, in order. */
  readonly readEvents: () => Promise<readonly string[]>
}

export type StartedInstance = {
  readonly pid: number
  readonly port: number
  /** Everything printed so far. */
  readonly output: () => string
  readonly waitForOutput: (text: string) => Promise<void>
  readonly signal: (name: NodeJS.Signals) => void
  readonly exitCode: () => Promise<number | null>
}

export async function makeCheckout(): Promise<Checkout> {
  const root = await temporaryDirectory('checkout')
  // As an ordinary checkout has it: the user postgres, as whom root runs PostgreSQL, can pass through.
  await chmod(root, 0o755)
  await cp(join(import.meta.dirname, 'checkout'), root, { recursive: true })
  await cp(join(REPOSITORY_DIRECTORY, 'packages/launcher'), join(root, 'packages/launcher'), {
    recursive: true,
  })
  await symlink(join(REPOSITORY_DIRECTORY, 'node_modules'), join(root, 'node_modules'))
  const dataDirectory = join(root, '.data')
  return {
    dataDirectory,
    start: () => startInstance(root),
    readEvents: async () => (await readFile(join(dataDirectory, 'events.log'), 'utf8')).trimEnd().split('\n'),
  }
}

async function startInstance(root: string): Promise<StartedInstance> {
  const port = await findFreePort()
  const child = spawn(
    process.execPath,
    ['--import', 'tsx', 'packages/launcher/src/start.ts', '--port', String(port)],
    { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] },
  )
  let output = ''
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding('utf8').on('data', (text: string) => (output += text))
  }
  const exited = new Promise<number | null>((resolve) => child.once('close', resolve))
  atEndOfFile(() => endAndWait(child, exited))
  return {
    pid: child.pid ?? 0,
    port,
    output: () => output,
    waitForOutput: async (text) => {
      await waitUntil(
        () => {
          if (output.includes(text)) return true
          if (child.exitCode !== null)
            throw new Error(`The launcher ended without printing "${text}":\n${output}`)
          return false
        },
        { timeoutMs: 60_000, description: `"${text}" in the launcher's output` },
      )
    },
    signal: (name) => child.kill(name),
    exitCode: () => exited,
  }
}

async function endAndWait(child: ChildProcess, exited: Promise<unknown>): Promise<void> {
  if (child.exitCode === null && child.signalCode === null) child.kill('SIGTERM')
  await exited
}

/** Command lines of living processes that work in or for the directory. */
export async function listProcessesOf(directory: string): Promise<readonly string[]> {
  const found: string[] = []
  for (const entry of await readdir('/proc')) {
    const read = (name: string): Promise<string> => readFile(`/proc/${entry}/${name}`, 'utf8').catch(() => '')
    if (!/^\d+$/.test(entry)) continue
    const [commandLine, environment] = [await read('cmdline'), await read('environ')]
    if (commandLine.includes(directory) || environment.includes(directory)) found.push(commandLine)
  }
  return found
}
