import { readFile } from 'node:fs/promises'
import { join } from 'node:path'

import { z } from 'zod'

import { runCommand } from '../run-command.ts'
import { formatDuration } from '../start/announcement.ts'
import type { Step } from './steps.ts'

export type StepResult = {
  readonly name: string
  readonly passed: boolean
  readonly durationMs: number
  /** Absent for a step that runs no tests, or whose tests never began. */
  readonly counts?: TestCounts
}

export type TestCounts = { readonly passed: number; readonly failed: number }

export type RunOptions = {
  readonly repository: string
  readonly environment: NodeJS.ProcessEnv
  readonly signal: AbortSignal
  readonly log: (text: string) => void
}

/** Two, since a check keeps one core busy and the machines that run this have two. */
const SIDE_BY_SIDE = 2

const countsSchema = z
  .object({ numPassedTests: z.number(), numFailedTests: z.number() })
  .transform(({ numPassedTests, numFailedTests }) => ({ passed: numPassedTests, failed: numFailedTests }))

/** Runs every step, whether or not earlier ones failed, and returns their results in the steps' order. */
export async function runSteps(steps: readonly Step[], options: RunOptions): Promise<readonly StepResult[]> {
  const results = new Map<Step, StepResult>()
  const queue = steps.filter((step) => !step.alone)
  const work = async (): Promise<void> => {
    for (let step = queue.shift(); step !== undefined; step = queue.shift()) {
      results.set(step, await runStep(step, options))
    }
  }
  await Promise.all(Array.from({ length: SIDE_BY_SIDE }, work))
  for (const step of steps.filter((candidate) => candidate.alone)) {
    results.set(step, await runStep(step, options))
  }
  return steps.flatMap((step) => results.get(step) ?? [])
}

async function runStep(
  step: Step,
  { repository, environment, signal, log }: RunOptions,
): Promise<StepResult> {
  const startedAt = performance.now()
  const output: string[] = []
  // Alone it may print as it goes; side by side the outputs would mix.
  const onLine = step.alone ? log : (line: string): void => void output.push(line)
  log(`▶ ${step.name}`)
  const passed = await runCommand({
    name: step.name,
    command: process.execPath,
    commandArguments: [join(repository, 'node_modules', step.program), ...step.programArguments],
    directory: repository,
    environment,
    signal,
    onLine,
  }).then(
    () => true,
    () => false,
  )
  signal.throwIfAborted()
  const durationMs = performance.now() - startedAt
  const verdict = `${passed ? '✔' : '✘'} ${step.name} (${formatDuration(durationMs)})`
  log(passed || output.length === 0 ? verdict : `${output.join('\n')}\n${verdict}`)
  const counts = step.countsFile === undefined ? undefined : await readCounts(step.countsFile)
  return { name: step.name, passed, durationMs, ...(counts === undefined ? {} : { counts }) }
}

async function readCounts(countsFile: string): Promise<TestCounts | undefined> {
  const text = await readFile(countsFile, 'utf8').catch(() => undefined)
  return text === undefined ? undefined : countsSchema.parse(JSON.parse(text))
}
