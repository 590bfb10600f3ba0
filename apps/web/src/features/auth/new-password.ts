import { passwordSchema } from '@fieldfare/contracts'
import { z } from 'zod'

const repeatedPassword = { password: passwordSchema, repeated: z.string() }

type Repeated = { password: string; repeated: string }

function isRepeated({ password, repeated }: Repeated): boolean {
  return password === repeated
}

const difference = { path: ['repeated'], message: 'The two passwords differ.' }

export const newPasswordSchema = z.object(repeatedPassword).refine(isRepeated, difference)

export const invitationFormSchema = z
  .object({ ...repeatedPassword, name: z.string().trim().min(1, 'Your name is needed.').max(120) })
  .refine(isRepeated, difference)

export const passwordHint =
  'At least 12 characters. A few words in a row are easy to remember and hard to guess.'
