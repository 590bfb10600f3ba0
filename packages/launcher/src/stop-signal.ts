const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const

/** npm passes on the Ctrl-C that the terminal has sent to everybody already, so one key press arrives twice. */
const SAME_KEY_PRESS_MS = 1_000

/** Exit code of a program ended by Ctrl-C, by custom of the shells: 128 + SIGINT. */
export const INTERRUPTED = 130

/**
 * A signal that is aborted when the person or the system asks this process to stop. Asking again ends it at once; the
 * kernel then ends its children.
 */
export function listenForStop(): AbortSignal {
  const controller = new AbortController()
  let firstAskedAt: number | undefined
  const handle = (): void => {
    firstAskedAt ??= performance.now()
    if (performance.now() - firstAskedAt > SAME_KEY_PRESS_MS) process.exit(INTERRUPTED)
    controller.abort()
  }
  for (const name of SIGNALS) process.on(name, handle)
  return controller.signal
}
