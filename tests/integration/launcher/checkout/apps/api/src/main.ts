import { appendFileSync } from 'node:fs'
import { createServer } from 'node:http'
import { join } from 'node:path'

/** Stands in for the API: answers, crashes when asked to, and notes when it was started and ended. */
const note = (line: string): void => {
  appendFileSync(join(process.env['FIELDFARE_DATA_DIR'] ?? '.', 'events.log'), `${line}\n`)
}

const server = createServer((request, response) => {
  if (request.url === '/crash') {
    console.error('the mixing desk is on fire')
    process.exit(3)
  }
  response.end(process.env['FIELDFARE_PUBLIC_URL'])
})
server.listen(Number(process.env['FIELDFARE_API_PORT']), '127.0.0.1', () => note('api started'))
process.once('SIGTERM', () => {
  note('api stopped')
  server.closeAllConnections()
  server.close()
})
