import { createHash, createHmac, randomBytes, timingSafeEqual } from 'node:crypto'
import { sessionIdSchema, userIdSchema, type SessionId, type UserId } from '@fieldfare/contracts'
import jsonwebtoken from 'jsonwebtoken'
import { z } from 'zod'

/** Short, so that a stolen token is worth little; the session behind it is looked at on each request anyway. */
export const ACCESS_TOKEN_SECONDS = 600

const ALGORITHM = 'HS256'
const ISSUER = 'fieldfare'
const AUDIENCE = 'fieldfare-api'

const accessClaimsSchema = z.object({ sub: userIdSchema, sid: sessionIdSchema, purpose: z.literal('access') })

export type AccessClaims = { userId: UserId; sessionId: SessionId }

export type SessionTokens = {
  issueAccessToken: (claims: AccessClaims, now: Date) => string
  /** Null for everything that is not an access token of ours, valid at this moment. */
  readAccessToken: (token: string, now: Date) => AccessClaims | null
  /** A token that proves the page may read our cookies, good for one session only. */
  issueCsrfToken: (sessionId: SessionId) => string
  isCsrfTokenOf: (token: string, sessionId: SessionId) => boolean
}

/** One secret, but a key of its own for each purpose, so that no token can stand in for another. */
function deriveKey(secret: string, purpose: string): Buffer {
  return createHmac('sha256', secret).update(`fieldfare ${purpose}`).digest()
}

export function createSessionTokens(secret: string): SessionTokens {
  const accessKey = deriveKey(secret, 'access token')
  const csrfKey = deriveKey(secret, 'csrf token')
  const signNonce = (nonce: string, sessionId: SessionId) =>
    createHmac('sha256', csrfKey).update(`${sessionId}.${nonce}`).digest('base64url')

  return {
    issueAccessToken: (claims, now) => {
      const issuedAt = Math.floor(now.getTime() / 1000)
      return jsonwebtoken.sign(
        {
          sid: claims.sessionId,
          purpose: 'access',
          iat: issuedAt,
          nbf: issuedAt,
          exp: issuedAt + ACCESS_TOKEN_SECONDS,
        },
        accessKey,
        { algorithm: ALGORITHM, subject: claims.userId, issuer: ISSUER, audience: AUDIENCE },
      )
    },
    readAccessToken: (token, now) => {
      try {
        const payload = jsonwebtoken.verify(token, accessKey, {
          algorithms: [ALGORITHM],
          issuer: ISSUER,
          audience: AUDIENCE,
          clockTimestamp: Math.floor(now.getTime() / 1000),
        })
        const claims = accessClaimsSchema.safeParse(payload)
        return claims.success ? { userId: claims.data.sub, sessionId: claims.data.sid } : null
      } catch (error) {
        if (error instanceof jsonwebtoken.JsonWebTokenError) return null
        throw error
      }
    },
    issueCsrfToken: (sessionId) => {
      const nonce = randomBytes(18).toString('base64url')
      return `${nonce}.${signNonce(nonce, sessionId)}`
    },
    isCsrfTokenOf: (token, sessionId) => {
      const [nonce = '', signature = ''] = token.split('.')
      return isSameText(signature, signNonce(nonce, sessionId))
    },
  }
}

/** Compares in constant time. */
export function isSameText(left: string, right: string): boolean {
  const digest = (text: string) => createHash('sha256').update(text).digest()
  return timingSafeEqual(digest(left), digest(right))
}

/** An opaque secret of 256 bits for a cookie or a link, and the hash that is kept of it. */
export function createOpaqueToken(): { token: string; tokenHash: Buffer } {
  const token = randomBytes(32).toString('base64url')
  return { token, tokenHash: hashOpaqueToken(token) }
}

export function hashOpaqueToken(token: string): Buffer {
  return createHash('sha256').update(token).digest()
}
