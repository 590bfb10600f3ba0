import { describe, expect, it } from 'vitest'
import { readConfiguration } from './configuration.ts'

const least = {
  FIELDFARE_DATABASE_URL: 'postgres://127.0.0.1:5432/fieldfare',
  FIELDFARE_REDIS_URL: 'redis://127.0.0.1:6379',
  FIELDFARE_TOKEN_SECRET: 'x'.repeat(32),
}

describe('readConfiguration', () => {
  it('needs only addresses and a secret, and fills in the rest for this machine', () => {
    expect(readConfiguration(least)).toMatchObject({
      mode: 'development',
      apiPort: 4300,
      publicUrl: 'http://127.0.0.1:4300',
      storage: { kind: 'disk' },
      mail: { kind: 'inbox' },
      workerThreads: 2,
      webDirectory: null,
    })
  })

  it('names everything that is wrong at once, and never a value', () => {
    const read = () =>
      readConfiguration({ ...least, FIELDFARE_TOKEN_SECRET: 'hunter2', FIELDFARE_API_PORT: 'x' })
    expect(read).toThrow(/FIELDFARE_API_PORT[^]*FIELDFARE_TOKEN_SECRET/)
    expect(read).not.toThrow(/hunter2/)
  })

  it('counts an empty variable as not set', () => {
    expect(readConfiguration({ ...least, FIELDFARE_WEB_DIR: '' }).webDirectory).toBeNull()
    expect(() => readConfiguration({ ...least, FIELDFARE_REDIS_URL: '' })).toThrow(/FIELDFARE_REDIS_URL/)
  })

  it('needs a bucket and its keys for S3, a server for SMTP, an address in production', () => {
    const complaintsOf = (more: Record<string, string>) => () => readConfiguration({ ...least, ...more })
    expect(complaintsOf({ FIELDFARE_STORAGE: 's3' })).toThrow(
      /S3_BUCKET[^]*S3_ACCESS_KEY_ID[^]*S3_SECRET_ACCESS_KEY/,
    )
    expect(complaintsOf({ FIELDFARE_MAIL: 'smtp' })).toThrow(/FIELDFARE_SMTP_URL/)
    expect(complaintsOf({ FIELDFARE_MODE: 'production' })).toThrow(/FIELDFARE_PUBLIC_URL/)
  })
})
