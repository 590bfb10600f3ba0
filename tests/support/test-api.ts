import { randomUUID } from 'node:crypto'
import {
  endpoints,
  type Endpoint,
  type PartyId,
  type Role,
  type SessionId,
  type StationId,
  type UserId,
} from '@fieldfare/contracts'
import {
  configurationSchema,
  insertSession,
  insertUser,
  inTransaction,
  replaceUserScope,
  type Configuration,
  type Database,
} from '@fieldfare/database'
import { startApi, type RunningApi } from '@fieldfare/api'
import { pino } from 'pino'
import { createSessionTokens } from '../../apps/api/src/http/session-tokens.ts'
import { atEndOfFile } from './end-of-file.ts'
import { createTestDatabase } from './test-database.ts'
import { temporaryDirectory } from './temporary-directory.ts'
import { TestClient } from './test-client.ts'
import { testRedis } from './test-redis.ts'

/** The password of every user that tests make, hashed beforehand because hashing is slow on purpose. */
export const TEST_PASSWORD = 'correct horse battery'
const TEST_PASSWORD_HASH = '$2b$12$e0OJ58WcBaecF8eloyfcvOKrVli2KGZN//B4.5QGAwFutycDjIYGe'
export const TEST_TOKEN_SECRET = 'a secret that only the tests of this product know'

export type TestUser = { userId: UserId; email: string; role: Role }
export type TestScope = { stationIds?: readonly StationId[]; partyIds?: readonly PartyId[] }
export type SignedInClient = { client: TestClient; user: TestUser; sessionId: SessionId }

export type TestApi = {
  url: string
  database: Database
  configuration: Configuration
  dependencies: RunningApi['dependencies']
  anonymous: () => TestClient
  createUser: (role: Role, scope?: TestScope) => Promise<TestUser>
  /** A session made directly, without the slow check of a password. */
  openSession: (user: TestUser) => Promise<SignedInClient>
  /** A new user of this role with a session. */
  signInAs: (role: Role, scope?: TestScope) => Promise<SignedInClient>
}

/** The real API on a free port, with a database, Redis and storage of its own; stopped at the end of the test file. */
export async function startTestApi(settings: Record<string, string> = {}): Promise<TestApi> {
  const [database, redis, storage] = [
    await createTestDatabase(),
    await testRedis(),
    await temporaryDirectory(),
  ]
  const configuration = configurationSchema.parse({
    FIELDFARE_MODE: 'test',
    FIELDFARE_DATABASE_URL: database.url,
    FIELDFARE_REDIS_URL: redis.url,
    FIELDFARE_API_PORT: '0',
    FIELDFARE_PUBLIC_URL: 'http://fieldfare.test',
    FIELDFARE_STORAGE_DIR: storage,
    FIELDFARE_CACHE_DIR: await temporaryDirectory('cache'),
    FIELDFARE_TOKEN_SECRET: TEST_TOKEN_SECRET,
    ...settings,
  })
  const api = await startApi(configuration, { logger: pino({ level: 'silent' }) })
  atEndOfFile(() => api.close())
  return describeApi(api, configuration)
}

function describeApi(api: RunningApi, configuration: Configuration): TestApi {
  const { database } = api.dependencies
  const tokens = createSessionTokens(configuration.tokenSecret)

  async function createUser(role: Role, scope: TestScope = {}): Promise<TestUser> {
    const email = `${role}-${randomUUID()}@example.org`
    const userId = await inTransaction(database, async (trx) => {
      const id = await insertUser(trx, {
        email,
        name: `Test ${role}`,
        role,
        status: 'active',
        passwordHash: TEST_PASSWORD_HASH,
      })
      await replaceUserScope(trx, id, { stationIds: scope.stationIds ?? [], partyIds: scope.partyIds ?? [] })
      return id
    })
    return { userId, email, role }
  }

  async function openSession(user: TestUser): Promise<SignedInClient> {
    const expiresAt = new Date(Date.now() + 3_600_000)
    const { userId } = user
    const sessionId = await inTransaction(database, (trx) =>
      insertSession(trx, { userId, userAgent: 'test', expiresAt }),
    )
    const client = new TestClient(api.url)
    client.cookies.set('fieldfare_access', tokens.issueAccessToken({ userId, sessionId }, new Date()))
    client.cookies.set('fieldfare_csrf', tokens.issueCsrfToken(sessionId))
    return { client, user, sessionId }
  }

  return {
    url: api.url,
    database,
    configuration,
    dependencies: api.dependencies,
    anonymous: () => new TestClient(api.url),
    createUser,
    openSession,
    signInAs: async (role, scope) => openSession(await createUser(role, scope)),
  }
}

/** An endpoint by its id, for tests that name one in a table. */
export function endpointById(id: string): Endpoint {
  const endpoint = endpoints.find((candidate) => candidate.id === id)
  if (endpoint === undefined) throw new Error(`The contracts have no endpoint ${id}`)
  return endpoint
}
