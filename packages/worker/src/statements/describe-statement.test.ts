import { distributionIdSchema, instantSchema, partyIdSchema, statementIdSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { describeStatementDocument } from './describe-statement.ts'

const id = '11111111-1111-4111-8111-111111111111'

describe('a statement issued weeks after its approval', () => {
  it('is dated by the issue, and so is the time in which it may be questioned', () => {
    const document = describeStatementDocument({
      run: {
        id: distributionIdSchema.parse(id),
        month: '2026-11-01',
        status: 'issuing',
        currency: 'EUR',
        currencyDigits: 2,
        rulesVersion: '1',
        minimumMs: 5000,
        capMs: null,
        questionDays: 90,
        digest: 'a',
        requestedAt: instantSchema.parse('2026-12-01T09:00:00.000Z'),
        approvedAt: instantSchema.parse('2026-12-01T10:00:00.000Z'),
        issueRequestedAt: instantSchema.parse('2026-12-20T23:30:00.000Z'),
      },
      statement: {
        id: statementIdSchema.parse(id),
        number: '2026-11-0001',
        partyId: partyIdSchema.parse(id),
        partyName: 'Party',
        partyIpi: null,
        grossMinor: 0n,
        netMinor: 0n,
      },
      contents: { stations: [], deductions: [], lines: [], plays: [], holdbacks: [] },
      society: {
        name: 'Society',
        timeZone: 'Europe/Lisbon',
        currency: 'EUR',
        currencyDigits: 2,
      },
      publicUrl: 'https://example.org',
    })
    expect(document).toMatchObject({
      approvedOn: '2026-12-01',
      issuedOn: '2026-12-20',
      questionUntil: '2027-03-20',
    })
  })
})
