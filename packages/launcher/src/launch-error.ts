/** Something a person can put right: shown as one plain line, without a stack. */
export class LaunchError extends Error {
  override readonly name = 'LaunchError'
}
