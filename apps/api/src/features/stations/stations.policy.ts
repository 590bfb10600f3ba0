import type { Actor } from '@fieldfare/database'

/** Whoever reaches a station by their scope; the endpoint asks for the same roles. */
export function canUploadLogs(actor: Actor): boolean {
  return actor.role === 'uploader' || actor.role === 'clerk'
}

export function canEditStations(actor: Actor): boolean {
  return actor.role === 'admin'
}
