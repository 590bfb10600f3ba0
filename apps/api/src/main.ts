import { readConfiguration } from '@fieldfare/database'
import { startApi } from './server.ts'

const api = await startApi(readConfiguration(process.env))
const { logger } = api.dependencies
logger.info({ url: api.url }, 'the API listens')

let isStopping = false

function stop(signal: NodeJS.Signals): void {
  if (isStopping) return
  isStopping = true
  logger.info({ signal }, 'the API stops')
  api.close().then(
    () => process.exit(0),
    (error: unknown) => {
      logger.error({ err: error }, 'the API did not stop cleanly')
      process.exit(1)
    },
  )
}

process.on('SIGTERM', stop)
process.on('SIGINT', stop)
