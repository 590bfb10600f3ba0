import type { Actor } from '@fieldfare/database'

export function canEditCatalogue(actor: Pick<Actor, 'role'>): boolean {
  return actor.role === 'clerk'
}
