import { describe, expect, it } from 'vitest'

import { WaitTimeoutError, waitUntil } from './wait-until.ts'

describe('waitUntil', () => {
  it('returns the first answer that is something', async () => {
    const answers = [false, null, undefined, 0]
    expect(await waitUntil(() => answers.shift(), { everyMs: 1 })).toBe(0)
    expect(answers).toEqual([])
  })

  it('pauses between two looks instead of spinning', async () => {
    let looks = 0
    const count = (): false => {
      looks += 1
      return false
    }
    await expect(waitUntil(count, { everyMs: 20, timeoutMs: 100 })).rejects.toThrow(WaitTimeoutError)
    expect(looks).toBeGreaterThan(1)
    expect(looks).toBeLessThanOrEqual(6)
  })

  it('says what it waited for', async () => {
    const waiting = waitUntil(() => false, { everyMs: 1, timeoutMs: 5, description: 'the tide' })
    await expect(waiting).rejects.toThrow('Waited in vain for the tide')
  })

  it('passes on the error of the condition at once', async () => {
    const waiting = waitUntil(
      () => {
        throw new RangeError('the moon fell')
      },
      { timeoutMs: 60_000 },
    )
    await expect(waiting).rejects.toThrow(RangeError)
  })
})
