import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { calculateDistribution } from '../distribution/calculate-distribution.ts'
import { anyMonth } from '../testing/months.ts'
import { worked } from '../testing/worked-example.ts'
import { buildStatements } from './build-statements.ts'
import { type Payee } from './statement.ts'

const payees: readonly Payee[] = ['a', 'b', 'c', 'd', 'e'].map((letter) => ({
  partyId: `party-${letter}`,
  name: `Party ${letter.toUpperCase()}`,
  ipiNameNumber: null,
}))

function sum(amounts: readonly bigint[]): bigint {
  return amounts.reduce((total, amount) => total + amount, 0n)
}

describe('buildStatements', () => {
  it('shows the gross and each deduction behind the amounts worked out by hand', () => {
    // Net 8550 = a 2946 + b 1374 + c 1685 + held back 2545.
    // Administration 1250: 430.70, 200.88, 246.35, 372.08; two units left over go to b and a: 431, 201, 246, 372.
    // Social 200: 68.91, 32.14, 39.42, 59.53; two units left over go to a and what is held back: 69, 32, 39, 60.
    const statements = buildStatements(calculateDistribution(worked), payees)
    expect(
      statements.map(({ payee, grossMinor, deductions, netMinor }) => [
        payee.name,
        grossMinor,
        ...deductions.map(({ amountMinor }) => amountMinor),
        netMinor,
      ]),
    ).toEqual([
      ['Party A', 3446n, 431n, 69n, 2946n],
      ['Party B', 1607n, 201n, 32n, 1374n],
      ['Party C', 1970n, 246n, 39n, 1685n],
      ['Party D', 0n, 0n, 0n, 0n],
    ])
  })

  it('tells every claimant what is held back on their subjects, and nobody else', () => {
    const statements = buildStatements(calculateDistribution(worked), payees)
    const held = statements.map(({ payee, holdbacks }) => [
      payee.name,
      holdbacks.map(({ subjectId, reason }) => `${subjectId ?? ''} ${reason}`),
    ])
    expect(held).toEqual([
      ['Party A', ['work-2 shares-incomplete']],
      ['Party B', []],
      ['Party C', ['recording-2 shares-over-claimed']],
      ['Party D', ['recording-2 shares-over-claimed']],
    ])
  })

  it('refuses to leave an amount without a statement', () => {
    expect(() => buildStatements(calculateDistribution(worked), payees.slice(1))).toThrow(
      expect.objectContaining({ code: 'unknown-payee' }),
    )
  })

  it('closes every statement, and all statements together, in any month', () => {
    fc.assert(
      fc.property(anyMonth, (input) => {
        const distribution = calculateDistribution(input)
        const statements = buildStatements(distribution, payees)
        for (const statement of statements) {
          const deducted = sum(statement.deductions.map(({ amountMinor }) => amountMinor))
          expect(statement.grossMinor - deducted).toBe(statement.netMinor)
          expect(statement.worksMinor + statement.recordingsMinor).toBe(statement.netMinor)
          expect(sum(statement.lines.map(({ amountMinor }) => amountMinor))).toBe(statement.netMinor)
          expect(sum(statement.stations.map(({ netMinor }) => netMinor))).toBe(statement.netMinor)
          expect(sum(statement.stations.map(({ grossMinor }) => grossMinor))).toBe(statement.grossMinor)
        }
        const net = sum(statements.map(({ netMinor }) => netMinor))
        expect(net).toBe(distribution.totals.attributedMinor)
        const gross = sum(statements.map(({ grossMinor }) => grossMinor))
        expect(gross <= distribution.totals.feeMinor).toBe(true)
        if (distribution.totals.heldBackMinor === 0n && distribution.stations.every((s) => s.netMinor > 0n)) {
          expect(gross).toBe(distribution.totals.feeMinor)
        }
      }),
    )
  })
})
