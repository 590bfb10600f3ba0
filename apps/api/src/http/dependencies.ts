import type { Configuration, Database, ObjectStorage } from '@fieldfare/database'
import type { Redis } from 'ioredis'
import type { Logger } from 'pino'
import type { EventHub } from './event-hub.ts'

/** What every feature is built from. */
export type Dependencies = {
  database: Database
  redis: Redis
  storage: ObjectStorage
  configuration: Configuration
  logger: Logger
  /** The moment now; tests set it. */
  clock: () => Date
  /** Live progress for viewers. */
  events: EventHub
}
