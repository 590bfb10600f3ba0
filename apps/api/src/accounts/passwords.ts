import { compare, hash, truncates } from 'bcryptjs'
import { fieldRefused } from '../http/app-error.ts'

/** 2^12 rounds: about a third of a second, which a person does not notice and a guesser does. */
const BCRYPT_COST = 12

/** A hash nobody knows a password for: unknown accounts take as long to refuse as known ones. */
const NOBODYS_HASH = '$2b$12$kJ1OQuCf09yisMG4O5e5M.cxQ9PfS96ZIzzAMLRa/yi2bPHn5efce'

/** The same letters can be stored in several ways; keyboards differ, so compare one form (NIST SP 800-63B). */
function normalise(password: string): string {
  return password.normalize('NFKC')
}

/**
 * @param field - where to complain
 * @throws AppError when bcrypt would cut the password or stop reading in the middle of it
 */
export async function hashPassword(password: string, field: string): Promise<string> {
  const normalised = normalise(password)
  if (truncates(normalised)) throw fieldRefused(field, 'Use at most 72 bytes; some letters take two or more.')
  if (normalised.includes('\0'))
    throw fieldRefused(field, 'The password contains a character that cannot be used.')
  return hash(normalised, BCRYPT_COST)
}

/** False without a hash too, after the same time. */
export async function isPasswordRight(password: string, passwordHash: string | null): Promise<boolean> {
  const normalised = normalise(password)
  const isRight = await compare(normalised, passwordHash ?? NOBODYS_HASH)
  return isRight && passwordHash !== null && !truncates(normalised)
}
