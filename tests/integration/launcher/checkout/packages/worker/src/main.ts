import { appendFileSync } from 'node:fs'
import { join } from 'node:path'

/** Stands in for the worker: notes its process number, so that a test can end it, and when it was ended. */
const note = (line: string): void => {
  appendFileSync(join(process.env['FIELDFARE_DATA_DIR'] ?? '.', 'events.log'), `${line}\n`)
}

const alive = setInterval(() => undefined, 60_000)
note(`worker started ${process.pid}`)
process.once('SIGTERM', () => {
  note('worker stopped')
  clearInterval(alive)
})
