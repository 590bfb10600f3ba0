import { randomUUID } from 'node:crypto'
import type { RowShare } from './catalogue-row.ts'
import { nameKey, type HeldParty } from './catalogue-state.ts'

export type NewParty = HeldParty & { ipiCheckOk: boolean | null }

export type PartyChoice =
  { ok: true; partyId: string; warning: string | null } | { ok: false; message: string }

/** Finds the party of a share by IPI, else by name; those nobody knows yet are made once, however many rows name them. */
export class PartyPlan {
  readonly #byIpi = new Map<string, HeldParty>()
  readonly #byName = new Map<string, HeldParty[]>()
  readonly #created = new Map<string, NewParty>()

  constructor(held: readonly HeldParty[]) {
    for (const party of held) this.#learn(party)
  }

  choose(share: RowShare): PartyChoice {
    return share.partyIpi === null ? this.#byNameAlone(share) : this.#byNumber(share, share.partyIpi)
  }

  /** The party as it has to be made, if no row before has made it. */
  created(partyId: string): NewParty | null {
    return this.#created.get(partyId) ?? null
  }

  #byNumber(share: RowShare, ipi: string): PartyChoice {
    const held = this.#byIpi.get(ipi)
    if (held !== undefined) {
      const differs = share.partyName !== '' && nameKey(share.partyName) !== nameKey(held.name)
      const warning = differs ? `IPI ${ipi} is held as “${held.name}”; that name stays.` : null
      return { ok: true, partyId: held.id, warning }
    }
    if (share.partyName === '')
      return { ok: false, message: `IPI ${ipi} is not known; a new party needs a name.` }
    const namesakes = (this.#byName.get(nameKey(share.partyName)) ?? []).filter((party) => party.ipi === null)
    const warning =
      namesakes.length === 0
        ? null
        : `A party “${share.partyName}” without IPI is held too. Check whether it is the same.`
    return { ok: true, partyId: this.#create(share), warning }
  }

  #byNameAlone(share: RowShare): PartyChoice {
    const namesakes = this.#byName.get(nameKey(share.partyName)) ?? []
    const [only] = namesakes
    if (namesakes.length > 1) {
      return { ok: false, message: `Several parties are called “${share.partyName}”. Give the IPI.` }
    }
    return { ok: true, partyId: only?.id ?? this.#create(share), warning: null }
  }

  #create(share: RowShare): string {
    const party = {
      id: randomUUID(),
      name: share.partyName,
      ipi: share.partyIpi,
      ipiCheckOk: share.ipiCheckOk,
    }
    this.#created.set(party.id, party)
    this.#learn(party)
    return party.id
  }

  #learn(party: HeldParty): void {
    if (party.ipi !== null) this.#byIpi.set(party.ipi, party)
    const key = nameKey(party.name)
    this.#byName.set(key, [...(this.#byName.get(key) ?? []), party])
  }
}
