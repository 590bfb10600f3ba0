import type { Scope } from '@fieldfare/database'

/** A condition with its bindings, for `whereRaw`; null keeps every row. */
export type Condition = { sql: string; bindings: string[][] } | null

/** `heldBy` is SQL that is true where one of the parties bound to its place holds a share, on whatever days. */
function forScope(scope: Scope, heldBy: (partyIds: readonly string[]) => Condition): Condition {
  switch (scope.kind) {
    case 'all':
      return null
    case 'parties':
      return heldBy(scope.partyIds)
    case 'stations':
      return { sql: 'false', bindings: [] }
  }
}

/** Works the parties hold a share in, and works behind recordings they hold a share in. */
export function workHeldBy(partyIds: readonly string[]): Condition {
  return {
    sql: `(exists (select from shares where shares.work_id = works.id and shares.party_id = any(?::uuid[]))
      or exists (select from recordings as held join shares on shares.recording_id = held.id
        where held.work_id = works.id and shares.party_id = any(?::uuid[])))`,
    bindings: [[...partyIds], [...partyIds]],
  }
}

/** Recordings the parties hold a share in, and recordings of works they hold a share in. */
export function recordingHeldBy(partyIds: readonly string[]): Condition {
  return {
    sql: `exists (select from shares where shares.party_id = any(?::uuid[])
      and (shares.recording_id = recordings.id or shares.work_id = recordings.work_id))`,
    bindings: [[...partyIds]],
  }
}

export function worksInScope(scope: Scope): Condition {
  return forScope(scope, workHeldBy)
}

export function recordingsInScope(scope: Scope): Condition {
  return forScope(scope, recordingHeldBy)
}
