import { jobPayloadSchemas, type JobKind, type JobPayload, type ServerEvent } from '@fieldfare/contracts'
import type { z } from 'zod'
import type { Configuration, Database, ObjectStorage, Transaction } from '@fieldfare/database'
import type { Redis } from 'ioredis'
import type { Logger } from 'pino'
import type { ReferenceCatalogue } from '../engine/reference-catalogue.ts'
import type { ThreadPool } from '../engine/thread-pool.ts'
import type { MailTransport } from '../mail/mail-transport.ts'

/** What every job may use. */
export type WorkerServices = {
  configuration: Configuration
  database: Database
  redis: Redis
  storage: ObjectStorage
  threads: ThreadPool
  catalogue: ReferenceCatalogue
  mail: MailTransport
  logger: Logger
}

export type JobContext = WorkerServices & {
  /** Aborted when the job was taken away or the worker stops: then nothing may be written. */
  signal: AbortSignal
  /** Progress for those who watch; never the record. */
  tell: (event: ServerEvent) => Promise<void>
  /** Writes results and ends the job in one transaction, unless the job was taken away meanwhile. */
  finish: (write: (trx: Transaction) => Promise<void>) => Promise<void>
}

/** The job cannot succeed however often it is tried; the message is for people. */
export class JobRefused extends Error {
  override readonly name = 'JobRefused'
}

/** The job belongs to another worker now, or was called off; whatever was done is dropped. */
export class JobTakenAway extends Error {
  override readonly name = 'JobTakenAway'
}

/** Tries before a job counts as failed, and the pause after each. */
export type Retries = { attempts: number; pauseMs: (attempts: number) => number }

const FEW_RETRIES: Retries = { attempts: 3, pauseMs: (attempts) => 5000 * attempts }

export type JobHandler<Kind extends JobKind> = {
  run: (context: JobContext, payload: JobPayload<Kind>) => Promise<void>
  /** Where a few tries within seconds are not enough. */
  retries?: Retries
  /** Says on the subject itself that the job failed for good, in the transaction that fails the job. */
  onFailure?: (trx: Transaction, payload: JobPayload<Kind>, reason: string) => Promise<void>
}

/** A handler whose payload is still to be parsed: what the runner can call without knowing the kind. */
export type RunnableJob = {
  run: (context: JobContext, payload: unknown) => Promise<void>
  retries: Retries
  onFailure: (trx: Transaction, payload: unknown, reason: string) => Promise<void>
}

const payloadSchemas: { [Kind in JobKind]: z.ZodType<JobPayload<Kind>> } = jobPayloadSchemas

/** Joins a handler with the schema of its payload. */
export function bindJob<Kind extends JobKind>(kind: Kind, handler: JobHandler<Kind>): RunnableJob {
  const parse = (payload: unknown): JobPayload<Kind> => payloadSchemas[kind].parse(payload)
  return {
    run: (context, payload) => handler.run(context, parse(payload)),
    retries: handler.retries ?? FEW_RETRIES,
    onFailure: async (trx, payload, reason) => handler.onFailure?.(trx, parse(payload), reason),
  }
}
