import type { Role, ServerEvent } from '@fieldfare/contracts'
import { isStationInScope, type Scope } from '@fieldfare/database'

/** Whether somebody may hear of an event. The scope is that of this moment: it may change while a stream is open. */
export function mayHear(role: Role, scope: Scope, event: ServerEvent): boolean {
  switch (role) {
    case 'clerk':
    case 'auditor':
      return true
    case 'uploader':
      return event.kind === 'log-progress' && isStationInScope(scope, event.stationId)
    case 'publisher':
      return event.kind === 'distribution-progress' && event.status === 'issued'
    case 'admin':
      return event.kind !== 'distribution-progress'
  }
}
