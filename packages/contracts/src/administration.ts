import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'
import {
  emailSchema,
  instantSchema,
  mailMessageIdSchema,
  pageOf,
  pageQueryShape,
  partyIdSchema,
  stationIdSchema,
  textSchema,
  userIdSchema,
} from './primitives.ts'
import { roleSchema } from './roles.ts'

const tag = 'Administration'
const admins = ['admin'] as const

export const userStatusSchema = z.enum(['invited', 'active', 'disabled'])

export const userViewSchema = z.object({
  id: userIdSchema,
  email: z.string(),
  name: z.string(),
  role: roleSchema,
  status: userStatusSchema,
  stations: z.array(z.object({ id: stationIdSchema, name: z.string() })),
  parties: z.array(z.object({ id: partyIdSchema, name: z.string() })),
  createdAt: instantSchema,
  lastSignInAt: instantSchema.nullable(),
})
export type UserView = z.infer<typeof userViewSchema>

const scopeShape = {
  role: roleSchema,
  stationIds: z.array(stationIdSchema).default([]),
  partyIds: z.array(partyIdSchema).default([]),
}

type RoleScope = { role: string; stationIds: readonly string[]; partyIds: readonly string[] }

function refineScope(scope: RoleScope, context: z.RefinementCtx): void {
  if (scope.role === 'uploader' && scope.stationIds.length === 0) {
    context.addIssue({
      code: 'custom',
      path: ['stationIds'],
      message: 'A log uploader needs at least one station.',
    })
  }
  if (scope.role === 'publisher' && scope.partyIds.length === 0) {
    context.addIssue({ code: 'custom', path: ['partyIds'], message: 'A publisher needs at least one party.' })
  }
}

export const userInvitationSchema = z
  .object({ email: emailSchema, name: textSchema('Name', 120), ...scopeShape })
  .superRefine(refineScope)

export const userUpdateSchema = z
  .object({ name: textSchema('Name', 120), status: z.enum(['active', 'disabled']), ...scopeShape })
  .superRefine(refineScope)

export const listUsers = defineEndpoint({
  id: 'listUsers',
  method: 'GET',
  path: '/api/users',
  tag,
  summary: 'All users with role, scope and last sign-in',
  access: admins,
  query: z.object({ ...pageQueryShape, search: z.string().trim().max(100).optional() }),
  answer: { kind: 'json', schema: pageOf(userViewSchema) },
})

export const inviteUser = defineEndpoint({
  id: 'inviteUser',
  method: 'POST',
  path: '/api/users/invitations',
  tag,
  summary: 'Invite a person by e-mail; inviting the same address again sends a new link',
  access: admins,
  body: userInvitationSchema,
  answer: { kind: 'json', schema: userViewSchema },
})

export const getUser = defineEndpoint({
  id: 'getUser',
  method: 'GET',
  path: '/api/users/:userId',
  tag,
  summary: 'One user',
  access: admins,
  params: z.object({ userId: userIdSchema }),
  answer: { kind: 'json', schema: userViewSchema },
})

export const updateUser = defineEndpoint({
  id: 'updateUser',
  method: 'PATCH',
  path: '/api/users/:userId',
  tag,
  summary: 'Change name, role, scope or status; a change of role, scope or status ends the sessions',
  access: admins,
  params: z.object({ userId: userIdSchema }),
  body: userUpdateSchema,
  answer: { kind: 'json', schema: userViewSchema },
})

export const mailMessageSchema = z.object({
  id: mailMessageIdSchema,
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  createdAt: instantSchema,
  sentAt: instantSchema.nullable(),
})

export const listInbox = defineEndpoint({
  id: 'listInbox',
  method: 'GET',
  path: '/api/inbox',
  tag,
  summary: 'The local inbox: every e-mail that would have left; only where mail is not sent for real',
  access: admins,
  query: z.object(pageQueryShape),
  answer: { kind: 'json', schema: pageOf(mailMessageSchema) },
})

export const systemHealthSchema = z.object({
  checkedAt: instantSchema,
  database: z.object({ ok: z.boolean(), sizeBytes: z.number(), version: z.string() }),
  redis: z.object({ ok: z.boolean() }),
  storage: z.object({
    kind: z.enum(['disk', 's3']),
    ok: z.boolean(),
    objects: z.number(),
    bytes: z.number(),
  }),
  queues: z.array(
    z.object({
      kind: z.string(),
      label: z.string(),
      waiting: z.number(),
      running: z.number(),
      doneLastDay: z.number(),
      failedLastDay: z.number(),
      oldestWaitingAt: instantSchema.nullable(),
    }),
  ),
  workers: z.array(
    z.object({
      name: z.string(),
      lastSeenAt: instantSchema,
      indexRecordings: z.number(),
      indexBytes: z.number(),
    }),
  ),
  recentFailures: z.array(z.object({ kind: z.string(), message: z.string(), failedAt: instantSchema })),
})
export type SystemHealth = z.infer<typeof systemHealthSchema>

export const getSystemHealth = defineEndpoint({
  id: 'getSystemHealth',
  method: 'GET',
  path: '/api/system',
  tag,
  summary: 'Queues, workers, database and storage',
  access: admins,
  answer: { kind: 'json', schema: systemHealthSchema },
})

export const auditEventSchema = z.object({
  id: z.string(),
  at: instantSchema,
  actorName: z.string(),
  action: z.string(),
  subjectKind: z.string(),
  subjectId: z.string(),
  summary: z.string(),
})

export const listAuditEvents = defineEndpoint({
  id: 'listAuditEvents',
  method: 'GET',
  path: '/api/audit-events',
  tag,
  summary: 'Who did what and when, newest first',
  access: ['auditor', 'admin'],
  query: z.object({
    ...pageQueryShape,
    subjectKind: z.string().max(40).optional(),
    subjectId: z.string().max(60).optional(),
    search: z.string().trim().max(100).optional(),
  }),
  answer: { kind: 'json', schema: pageOf(auditEventSchema) },
})

export const getLiveness = defineEndpoint({
  id: 'getLiveness',
  method: 'GET',
  path: '/api/health/live',
  tag,
  summary: 'The process answers',
  access: 'public',
  answer: { kind: 'json', schema: z.object({ status: z.literal('alive') }) },
})

export const getReadiness = defineEndpoint({
  id: 'getReadiness',
  method: 'GET',
  path: '/api/health/ready',
  tag,
  summary: 'Database and queue can be reached',
  access: 'public',
  answer: { kind: 'json', schema: z.object({ status: z.literal('ready') }) },
})
