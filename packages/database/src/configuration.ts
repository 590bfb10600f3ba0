import { join } from 'node:path'
import { z } from 'zod'

const secretSchema = z.string().min(32, 'must have at least 32 characters')
const optionalText = z.string().optional()

const environmentSchema = z
  .object({
    FIELDFARE_MODE: z.enum(['development', 'production', 'test']).default('development'),
    FIELDFARE_DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/ }),
    FIELDFARE_REDIS_URL: z.url({ protocol: /^rediss?$/ }),
    FIELDFARE_API_PORT: z.coerce.number().int().min(0).max(65_535).default(4300),
    FIELDFARE_API_HOST: z.string().min(1).default('127.0.0.1'),
    FIELDFARE_PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(),
    FIELDFARE_TOKEN_SECRET: secretSchema,
    FIELDFARE_STORAGE: z.enum(['disk', 's3']).default('disk'),
    FIELDFARE_STORAGE_DIR: z.string().min(1).default('.data/storage'),
    FIELDFARE_S3_ENDPOINT: z.url().optional(),
    FIELDFARE_S3_REGION: z.string().min(1).default('us-east-1'),
    FIELDFARE_S3_BUCKET: optionalText,
    FIELDFARE_S3_ACCESS_KEY_ID: optionalText,
    FIELDFARE_S3_SECRET_ACCESS_KEY: optionalText,
    FIELDFARE_MAIL: z.enum(['inbox', 'smtp']).default('inbox'),
    FIELDFARE_SMTP_URL: z.url({ protocol: /^smtps?$/ }).optional(),
    FIELDFARE_MAIL_FROM: z.string().min(3).default('Fieldfare <fieldfare@localhost.invalid>'),
    FIELDFARE_WORKER_THREADS: z.coerce.number().int().min(1).max(256).default(2),
    FIELDFARE_WEB_DIR: optionalText,
    FIELDFARE_CACHE_DIR: z.string().min(1).default('.data/cache'),
    FIELDFARE_LOG_LEVEL: z
      .enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'])
      .default('info'),
    FIELDFARE_UPLOAD_LIMIT_BYTES: z.coerce
      .number()
      .int()
      .min(1)
      .default(4 * 1024 ** 3),
  })
  .superRefine((environment, context) => {
    const needs = (name: keyof typeof environment, when: boolean) => {
      if (when && environment[name] === undefined)
        context.addIssue({ code: 'custom', path: [name], message: 'is needed' })
    }
    needs('FIELDFARE_S3_BUCKET', environment.FIELDFARE_STORAGE === 's3')
    needs('FIELDFARE_S3_ACCESS_KEY_ID', environment.FIELDFARE_STORAGE === 's3')
    needs('FIELDFARE_S3_SECRET_ACCESS_KEY', environment.FIELDFARE_STORAGE === 's3')
    needs('FIELDFARE_SMTP_URL', environment.FIELDFARE_MAIL === 'smtp')
    needs('FIELDFARE_PUBLIC_URL', environment.FIELDFARE_MODE === 'production')
  })

/** Where files are kept: a folder, or a bucket of an S3-compatible store. */
const storageConfigurationSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('disk'), directory: z.string() }),
  z.object({
    kind: z.literal('s3'),
    endpoint: z.string().optional(),
    region: z.string(),
    bucket: z.string(),
    accessKeyId: z.string(),
    secretAccessKey: z.string(),
  }),
])
export type StorageConfiguration = z.infer<typeof storageConfigurationSchema>

/** How mail leaves: into the inbox shown in the product, or through an SMTP server. */
const mailConfigurationSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('inbox'), from: z.string() }),
  z.object({ kind: z.literal('smtp'), from: z.string(), url: z.string() }),
])
export type MailConfiguration = z.infer<typeof mailConfigurationSchema>

type Environment = z.output<typeof environmentSchema>

function storageOf(environment: Environment): z.input<typeof storageConfigurationSchema> {
  if (environment.FIELDFARE_STORAGE === 'disk')
    return { kind: 'disk', directory: environment.FIELDFARE_STORAGE_DIR }
  return {
    kind: 's3',
    endpoint: environment.FIELDFARE_S3_ENDPOINT,
    region: environment.FIELDFARE_S3_REGION,
    bucket: environment.FIELDFARE_S3_BUCKET ?? '',
    accessKeyId: environment.FIELDFARE_S3_ACCESS_KEY_ID ?? '',
    secretAccessKey: environment.FIELDFARE_S3_SECRET_ACCESS_KEY ?? '',
  }
}

/** The whole configuration of API and worker, read from environment variables named FIELDFARE_…. */
export const configurationSchema = environmentSchema.transform((environment) => ({
  mode: environment.FIELDFARE_MODE,
  databaseUrl: environment.FIELDFARE_DATABASE_URL,
  redisUrl: environment.FIELDFARE_REDIS_URL,
  apiPort: environment.FIELDFARE_API_PORT,
  apiHost: environment.FIELDFARE_API_HOST,
  /** The address people type, without a slash at its end: links in mail and the origin check use it. */
  publicUrl: (
    environment.FIELDFARE_PUBLIC_URL ?? `http://127.0.0.1:${environment.FIELDFARE_API_PORT}`
  ).replace(/\/+$/, ''),
  tokenSecret: environment.FIELDFARE_TOKEN_SECRET,
  storage: storageConfigurationSchema.parse(storageOf(environment)),
  mail: mailConfigurationSchema.parse(
    environment.FIELDFARE_MAIL === 'inbox'
      ? { kind: 'inbox', from: environment.FIELDFARE_MAIL_FROM }
      : { kind: 'smtp', from: environment.FIELDFARE_MAIL_FROM, url: environment.FIELDFARE_SMTP_URL },
  ),
  workerThreads: environment.FIELDFARE_WORKER_THREADS,
  webDirectory: environment.FIELDFARE_WEB_DIR ?? null,
  cacheDirectory: environment.FIELDFARE_CACHE_DIR,
  /** Uploads in flight; each is removed when its request ends. */
  uploadDirectory: join(environment.FIELDFARE_CACHE_DIR, 'uploads'),
  uploadLimitBytes: environment.FIELDFARE_UPLOAD_LIMIT_BYTES,
  logLevel: environment.FIELDFARE_LOG_LEVEL,
}))
export type Configuration = z.output<typeof configurationSchema>

/**
 * Reads the configuration once, at start-up. An empty variable counts as not set.
 *
 * @throws Error naming every variable that is missing or wrong, without its value.
 */
export function readConfiguration(environment: Record<string, string | undefined>): Configuration {
  const given = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  )
  const result = configurationSchema.safeParse(given)
  if (result.success) return result.data
  const complaints = result.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`)
  throw new Error(`The configuration is not complete:\n${complaints.join('\n')}`)
}
