/** A value that the global set-up leaves in the environment of every test process. */
export function readTestEnvironment(
  name: 'FIELDFARE_TEST_MAINTENANCE_URL' | 'FIELDFARE_TEST_REDIS_URL',
): string {
  const value = process.env[name]
  if (value === undefined) {
    throw new Error(
      `${name} is not set: run this test in a vitest project with tests/support/global-setup.ts.`,
    )
  }
  return value
}
