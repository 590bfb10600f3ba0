import { setTimeout as pause } from 'node:timers/promises'

export type WaitOptions = {
  /** Time between two looks at the condition. @defaultValue 50 */
  readonly everyMs?: number
  /** Time after which waiting is given up. @defaultValue 10_000 */
  readonly timeoutMs?: number
  /** Completes the sentence "Waited in vain for …". */
  readonly description?: string
}

/**
 * Asks `condition` until it answers with something other than `false`, `null` or `undefined`, and returns that.
 * A condition that throws ends the wait at once with its error.
 *
 * @throws {@link WaitTimeoutError} when `timeoutMs` have passed
 */
export async function waitUntil<Value>(
  condition: () => Promise<Value | false | null | undefined> | Value | false | null | undefined,
  { everyMs = 50, timeoutMs = 10_000, description = 'a condition' }: WaitOptions = {},
): Promise<Value> {
  const deadline = performance.now() + timeoutMs
  while (true) {
    const answer = await condition()
    if (answer !== false && answer !== null && answer !== undefined) return answer
    if (performance.now() >= deadline) {
      throw new WaitTimeoutError(`Waited in vain for ${description} (${timeoutMs} ms).`)
    }
    await pause(everyMs)
  }
}

export class WaitTimeoutError extends Error {
  override readonly name = 'WaitTimeoutError'
}
