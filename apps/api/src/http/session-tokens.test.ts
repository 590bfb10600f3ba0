import { sessionIdSchema, userIdSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { createSessionTokens } from './session-tokens.ts'

const claims = {
  userId: userIdSchema.parse('7b0c3a52-1111-4111-8111-111111111111'),
  sessionId: sessionIdSchema.parse('7b0c3a52-2222-4222-8222-222222222222'),
}
const otherSession = sessionIdSchema.parse('7b0c3a52-3333-4333-8333-333333333333')
const now = new Date('2026-11-29T06:00:00Z')
const tokens = createSessionTokens('a secret of at least 32 characters')

describe('access tokens', () => {
  it('are read back until ten minutes have passed', () => {
    const token = tokens.issueAccessToken(claims, now)
    expect(tokens.readAccessToken(token, new Date('2026-11-29T06:09:59Z'))).toEqual(claims)
    expect(tokens.readAccessToken(token, new Date('2026-11-29T06:10:00Z'))).toBeNull()
    expect(tokens.readAccessToken(token, new Date('2026-11-29T05:59:00Z'))).toBeNull()
  })

  it('are not CSRF tokens, nor the other way round', () => {
    expect(tokens.isCsrfTokenOf(tokens.issueAccessToken(claims, now), claims.sessionId)).toBe(false)
    expect(tokens.readAccessToken(tokens.issueCsrfToken(claims.sessionId), now)).toBeNull()
  })
})

describe('CSRF tokens', () => {
  it('belong to one session and one secret', () => {
    const token = tokens.issueCsrfToken(claims.sessionId)
    expect(tokens.isCsrfTokenOf(token, claims.sessionId)).toBe(true)
    expect(tokens.isCsrfTokenOf(token, otherSession)).toBe(false)
    const others = createSessionTokens('another secret of at least 32 characters')
    expect(others.isCsrfTokenOf(token, claims.sessionId)).toBe(false)
  })

  it('cannot be made from nothing', () => {
    for (const forged of ['', '.', 'nonce.', '.signature']) {
      expect(tokens.isCsrfTokenOf(forged, claims.sessionId)).toBe(false)
    }
  })
})
