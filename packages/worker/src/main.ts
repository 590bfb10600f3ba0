import { readConfiguration } from '@fieldfare/database'
import { pino } from 'pino'
import { startWorker } from './worker.ts'

const configuration = readConfiguration(process.env)
const logger = pino({ level: configuration.logLevel, name: 'worker' })
const worker = await startWorker(configuration, logger)

function stop(): void {
  worker.stop().then(
    () => process.exit(0),
    (error: unknown) => {
      logger.error({ error }, 'the worker could not stop in order')
      process.exit(1)
    },
  )
}

process.once('SIGTERM', stop)
process.once('SIGINT', stop)
