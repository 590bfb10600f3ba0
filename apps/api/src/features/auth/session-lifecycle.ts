import type { SessionId, UserId } from '@fieldfare/contracts'
import {
  endSession,
  insertRefreshToken,
  insertSession,
  inTransaction,
  lockRefreshToken,
  markRefreshTokenRotated,
  recordAudit,
  type Database,
  type RefreshTokenRecord,
  type Transaction,
} from '@fieldfare/database'
import {
  ACCESS_TOKEN_SECONDS,
  createOpaqueToken,
  hashOpaqueToken,
  type SessionTokens,
} from '../../http/session-tokens.ts'
import type { SessionCookieValues } from '../../http/session-cookies.ts'

/** A session nobody used for this long is over. */
const IDLE_SECONDS = 12 * 3600
/** However much it is used, a session ends after this long and a password is asked again. */
const ABSOLUTE_SECONDS = 7 * 24 * 3600
/** Two tabs may exchange the same token at once; later than this a second use means it was stolen. */
export const REUSE_GRACE_MS = 10_000

export type OpenedSession = { userId: UserId; sessionId: SessionId; cookies: SessionCookieValues }

export type RefreshOutcome =
  { kind: 'renewed'; session: OpenedSession } | { kind: 'reused' } | { kind: 'unknown' }

export type SessionLifecycle = {
  open: (trx: Transaction, person: { userId: UserId; userAgent: string }) => Promise<OpenedSession>
  /** Exchanges a refresh token. A second use outside the grace ends the session for whoever holds it. */
  renew: (refreshToken: string) => Promise<RefreshOutcome>
}

const later = (now: Date, seconds: number) => new Date(now.getTime() + seconds * 1000)

export function createSessionLifecycle(options: {
  database: Database
  tokens: SessionTokens
  clock: () => Date
}): SessionLifecycle {
  const { database, tokens, clock } = options

  async function issue(
    trx: Transaction,
    session: { userId: UserId; sessionId: SessionId },
  ): Promise<{ refreshTokenId: string; opened: OpenedSession }> {
    const now = clock()
    const { token, tokenHash } = createOpaqueToken()
    const refreshTokenId = await insertRefreshToken(trx, {
      sessionId: session.sessionId,
      tokenHash,
      expiresAt: later(now, IDLE_SECONDS),
    })
    const cookies = {
      accessToken: tokens.issueAccessToken(session, now),
      accessSeconds: ACCESS_TOKEN_SECONDS,
      refreshToken: token,
      csrfToken: tokens.issueCsrfToken(session.sessionId),
      refreshSeconds: IDLE_SECONDS,
    }
    return { refreshTokenId, opened: { ...session, cookies } }
  }

  async function endReused(trx: Transaction, held: RefreshTokenRecord): Promise<RefreshOutcome> {
    await endSession(trx, { id: held.sessionId, userId: held.userId }, 'refresh-reused')
    await recordAudit(trx, {
      actor: null,
      action: 'end-session',
      subjectKind: 'session',
      subjectId: held.sessionId,
      summary: 'A refresh token was used a second time, so the session was ended.',
    })
    return { kind: 'reused' }
  }

  return {
    async open(trx, person) {
      const sessionId = await insertSession(trx, { ...person, expiresAt: later(clock(), ABSOLUTE_SECONDS) })
      const { opened } = await issue(trx, { userId: person.userId, sessionId })
      return opened
    },
    renew: (refreshToken) =>
      inTransaction(database, async (trx): Promise<RefreshOutcome> => {
        const held = await lockRefreshToken(trx, hashOpaqueToken(refreshToken))
        if (held === null || held.isExpired || !held.isSessionLive) return { kind: 'unknown' }
        if (held.rotatedAgoMs !== null && held.rotatedAgoMs > REUSE_GRACE_MS) return endReused(trx, held)
        const { refreshTokenId, opened } = await issue(trx, held)
        await markRefreshTokenRotated(trx, held.id, refreshTokenId)
        return { kind: 'renewed', session: { ...opened, userId: held.userId, sessionId: held.sessionId } }
      }),
  }
}
