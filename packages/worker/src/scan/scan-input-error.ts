/** Something the person at the terminal gave is wrong; the message is the one line they see. */
export class ScanInputError extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'ScanInputError'
  }
}
