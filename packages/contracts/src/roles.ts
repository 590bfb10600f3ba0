import { z } from 'zod'

/** The five roles of product use; the codes are stored and sent as written here. */
export const roles = ['uploader', 'clerk', 'publisher', 'auditor', 'admin'] as const

export const roleSchema = z.enum(roles)
export type Role = z.infer<typeof roleSchema>

/** What each role is called on screen. */
export const roleLabels = {
  uploader: 'Log uploader',
  clerk: 'Royalty clerk',
  publisher: 'Publisher',
  auditor: 'Auditor',
  admin: 'Administrator',
} as const satisfies Record<Role, string>
