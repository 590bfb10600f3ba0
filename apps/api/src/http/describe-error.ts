export type DescribedError = {
  type: string
  message: string
  stack?: string
  code?: string
  cause?: DescribedError
}

/**
 * An error as the log may hold it. Drivers hang the refused row or command on their errors, and with it names,
 * addresses and hashes; so only these parts are taken.
 */
export function describeError(error: unknown): DescribedError {
  if (!(error instanceof Error))
    return { type: typeof error, message: 'something that is no error was thrown' }
  return {
    type: error.name,
    message: error.message,
    ...(error.stack === undefined ? {} : { stack: error.stack }),
    ...('code' in error && typeof error.code === 'string' ? { code: error.code } : {}),
    ...(error.cause === undefined ? {} : { cause: describeError(error.cause) }),
  }
}
