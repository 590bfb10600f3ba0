import type { UserRecord } from '@fieldfare/database'

/** A user as administrators see them. */
export function presentUser(user: UserRecord) {
  return {
    id: user.id,
    email: user.email,
    name: user.name,
    role: user.role,
    status: user.status,
    stations: user.stations.map(({ id, name }) => ({ id, name })),
    parties: user.parties.map(({ id, name }) => ({ id, name })),
    createdAt: user.createdAt,
    lastSignInAt: user.lastSignInAt,
  }
}
