import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'
import {
  currencySchema,
  emailSchema,
  instantSchema,
  partyIdSchema,
  sessionIdSchema,
  stationIdSchema,
  textSchema,
  timeZoneSchema,
  userIdSchema,
} from './primitives.ts'
import { roleSchema } from './roles.ts'

const utf8 = new TextEncoder()

/** bcrypt reads at most 72 bytes, so a longer password is refused, never cut. */
export const passwordSchema = z
  .string()
  .min(12, 'Use at least 12 characters.')
  .refine(
    (password) => utf8.encode(password).length <= 72,
    'Use at most 72 bytes; some letters take two or more.',
  )

export const signedInUserSchema = z.object({
  id: userIdSchema,
  email: z.string(),
  name: z.string(),
  role: roleSchema,
  stations: z.array(z.object({ id: stationIdSchema, name: z.string(), timeZone: timeZoneSchema })),
  parties: z.array(z.object({ id: partyIdSchema, name: z.string() })),
})
export type SignedInUser = z.infer<typeof signedInUserSchema>

export const sessionViewSchema = z.object({
  user: signedInUserSchema,
  society: z.object({
    name: z.string(),
    currency: currencySchema,
    currencyDigits: z.number().int().min(0).max(4),
    timeZone: timeZoneSchema,
  }),
  /** True where mail goes to the local inbox that administrators can read in the product. */
  hasLocalInbox: z.boolean(),
})
export type SessionView = z.infer<typeof sessionViewSchema>

export const sessionSummarySchema = z.object({
  id: sessionIdSchema,
  createdAt: instantSchema,
  lastUsedAt: instantSchema,
  userAgent: z.string(),
  isCurrent: z.boolean(),
})

const tag = 'Sign-in'

export const signIn = defineEndpoint({
  id: 'signIn',
  method: 'POST',
  path: '/api/auth/sign-in',
  tag,
  summary: 'Sign in with e-mail address and password; sets the session cookies',
  access: 'public',
  body: z.object({
    email: emailSchema,
    password: z.string().min(1, 'Enter your password.').max(200, 'That is longer than a password can be.'),
  }),
  answer: { kind: 'json', schema: sessionViewSchema },
})

export const refreshSession = defineEndpoint({
  id: 'refreshSession',
  method: 'POST',
  path: '/api/auth/refresh',
  tag,
  summary: 'Exchange the refresh cookie for a new pair; using an old one again ends the session',
  access: 'public',
  answer: { kind: 'json', schema: sessionViewSchema },
})

export const getSession = defineEndpoint({
  id: 'getSession',
  method: 'GET',
  path: '/api/auth/session',
  tag,
  summary: 'Who is signed in, with scope and society',
  access: 'signed-in',
  answer: { kind: 'json', schema: sessionViewSchema },
})

export const signOut = defineEndpoint({
  id: 'signOut',
  method: 'POST',
  path: '/api/auth/sign-out',
  tag,
  summary: 'End this session at once',
  access: 'signed-in',
  answer: { kind: 'empty' },
})

export const listSessions = defineEndpoint({
  id: 'listSessions',
  method: 'GET',
  path: '/api/auth/sessions',
  tag,
  summary: 'My open sessions',
  access: 'signed-in',
  answer: { kind: 'json', schema: z.object({ items: z.array(sessionSummarySchema) }) },
})

export const endSession = defineEndpoint({
  id: 'endSession',
  method: 'DELETE',
  path: '/api/auth/sessions/:sessionId',
  tag,
  summary: 'End one of my sessions',
  access: 'signed-in',
  params: z.object({ sessionId: sessionIdSchema }),
  answer: { kind: 'empty' },
})

export const signOutEverywhere = defineEndpoint({
  id: 'signOutEverywhere',
  method: 'POST',
  path: '/api/auth/sign-out-everywhere',
  tag,
  summary: 'End all my sessions, this one too',
  access: 'signed-in',
  answer: { kind: 'empty' },
})

export const changePassword = defineEndpoint({
  id: 'changePassword',
  method: 'POST',
  path: '/api/auth/change-password',
  tag,
  summary: 'Change my password; my other sessions end',
  access: 'signed-in',
  body: z.object({
    currentPassword: z.string().min(1, 'Enter your present password.').max(200),
    newPassword: passwordSchema,
  }),
  answer: { kind: 'empty' },
})

export const requestPasswordReset = defineEndpoint({
  id: 'requestPasswordReset',
  method: 'POST',
  path: '/api/auth/password-reset-requests',
  tag,
  summary: 'Send a password reset link; the answer is the same whether the address is known or not',
  access: 'public',
  body: z.object({ email: emailSchema }),
  answer: { kind: 'empty' },
})

const linkTokenSchema = z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'This link is not complete.')

export const resetPassword = defineEndpoint({
  id: 'resetPassword',
  method: 'POST',
  path: '/api/auth/password-resets',
  tag,
  summary: 'Set a new password with the link from the e-mail; all sessions end',
  access: 'public',
  body: z.object({ token: linkTokenSchema, password: passwordSchema }),
  answer: { kind: 'empty' },
})

export const readInvitation = defineEndpoint({
  id: 'readInvitation',
  method: 'POST',
  path: '/api/auth/invitations/read',
  tag,
  summary: 'What an invitation link is for',
  access: 'public',
  body: z.object({ token: linkTokenSchema }),
  answer: {
    kind: 'json',
    schema: z.object({ email: z.string(), name: z.string(), role: roleSchema, societyName: z.string() }),
  },
})

export const acceptInvitation = defineEndpoint({
  id: 'acceptInvitation',
  method: 'POST',
  path: '/api/auth/invitations/accept',
  tag,
  summary: 'Accept an invitation: confirm the name, set a password; signs in',
  access: 'public',
  body: z.object({ token: linkTokenSchema, name: textSchema('Your name', 120), password: passwordSchema }),
  answer: { kind: 'json', schema: sessionViewSchema },
})
