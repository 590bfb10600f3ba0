/** Whether `error` carries the given code, as Node's system errors and PostgreSQL's errors do. */
export function hasCode(error: unknown, code: string): boolean {
  return error instanceof Error && 'code' in error && error.code === code
}
