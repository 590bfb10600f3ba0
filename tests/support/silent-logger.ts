export type LogEntry = {
  readonly level: 'debug' | 'info' | 'warn' | 'error'
  readonly values: readonly unknown[]
}

type Log = (...values: unknown[]) => void

export type RecordingLogger = Readonly<Record<LogEntry['level'], Log>> & {
  /** Everything logged so far, oldest first. */
  readonly entries: readonly LogEntry[]
}

/** Keeps the console quiet and remembers what was logged, so that a test can ask for a log line. */
export function silentLogger(): RecordingLogger {
  const entries: LogEntry[] = []
  const record =
    (level: LogEntry['level']): Log =>
    (...values) => {
      entries.push({ level, values })
    }
  return {
    debug: record('debug'),
    info: record('info'),
    warn: record('warn'),
    error: record('error'),
    entries,
  }
}
