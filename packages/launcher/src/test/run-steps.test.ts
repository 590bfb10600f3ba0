import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

import { afterAll, beforeAll, describe, expect, it } from 'vitest'

import { runSteps, type StepResult } from './run-steps.ts'
import type { Step } from './steps.ts'
import { summarise } from './summary.ts'

let repository: string

beforeAll(async () => {
  repository = await mkdtemp(join(tmpdir(), 'fieldfare-steps-'))
  await mkdir(join(repository, 'node_modules'))
  await writeFile(join(repository, 'node_modules/passes.js'), 'console.log("all is well")\n')
  await writeFile(join(repository, 'node_modules/fails.js'), 'console.log("a leak"); process.exit(2)\n')
  await writeFile(
    join(repository, 'node_modules/hangs.js'),
    'console.log("waiting"); setTimeout(() => {}, 600000)\n',
  )
})

afterAll(async () => {
  await rm(repository, { recursive: true })
})

function step(name: string, program: string, alone = false): Step {
  return { name, program, programArguments: [], alone }
}

function run(steps: readonly Step[], signal = new AbortController().signal, lines: string[] = []) {
  return runSteps(steps, { repository, environment: process.env, signal, log: (text) => lines.push(text) })
}

describe('runSteps', () => {
  it('goes on after a failed step and returns the results in the order of the steps', async () => {
    const results = await run([
      step('alone', 'passes.js', true),
      step('bad', 'fails.js'),
      step('good', 'passes.js'),
    ])
    expect(results.map(({ name, passed }) => ({ name, passed }))).toEqual([
      { name: 'alone', passed: true },
      { name: 'bad', passed: false },
      { name: 'good', passed: true },
    ])
  })

  it('shows the output of a failed step and keeps that of a passed one to itself', async () => {
    const lines: string[] = []
    await run([step('bad', 'fails.js'), step('good', 'passes.js')], undefined, lines)
    expect(lines.join('\n')).toContain('a leak')
    expect(lines.join('\n')).not.toContain('all is well')
  })

  it('ends the running step when it is asked to stop', async () => {
    const controller = new AbortController()
    const lines: string[] = []
    const running = runSteps([step('endless', 'hangs.js', true)], {
      repository,
      environment: process.env,
      signal: controller.signal,
      log: (text) => {
        lines.push(text)
        if (text === 'waiting') controller.abort()
      },
    })
    await expect(running).rejects.toThrow(/abort/i)
  })
})

describe('summarise', () => {
  const results: readonly StepResult[] = [
    { name: 'lint', passed: true, durationMs: 61_000 },
    { name: 'unit', passed: false, durationMs: 1_500, counts: { passed: 40, failed: 2 } },
    { name: 'browser', passed: true, durationMs: 2_000, counts: { passed: 9, failed: 0 } },
  ]

  it('shows step, result and duration of each', () => {
    const text = summarise(results, 65_000)
    expect(text).toMatch(/lint +passed +1 min 01 s/)
    expect(text).toMatch(/unit +FAILED +1\.5 s +40 tests passed, 2 failed/)
  })

  it('closes with the number of tests on a line of its own', () => {
    expect(summarise(results, 65_000).split('\n').at(-1)).toBe('49 passed, 2 failed')
  })
})
