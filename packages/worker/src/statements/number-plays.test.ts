import { describe, expect, it } from 'vitest'
import { formatNumbers, numberPlays } from './number-plays.ts'
import { sampleStatement } from './testing/sample-statement.ts'

describe('numberPlays', () => {
  it('gives every play one number, from 1, in the order the lines name them', () => {
    const statement = sampleStatement(2, 5)
    const { plays } = numberPlays(statement)
    const references = statement.sections.flatMap(({ lines }) =>
      lines.flatMap((line) => line.plays.map(({ reference }) => reference)),
    )
    expect(plays.map(({ number }) => number)).toEqual(references.map((_, index) => index + 1))
    expect(plays.map(({ reference }) => reference)).toEqual(references)
  })

  it('numbers a play once when it earned for its work and for its recording', () => {
    const statement = sampleStatement(1, 1)
    const [section] = statement.sections
    const [line] = section?.lines ?? []
    if (!section || !line) throw new Error('The sample has one line.')
    const twice = {
      ...statement,
      sections: [{ ...section, lines: [line, { ...line, right: 'recordings' as const }] }],
    }
    const numbers = numberPlays(twice)
    expect(numbers.plays).toHaveLength(line.plays.length)
    expect(twice.sections[0]?.lines.map((own) => numbers.of(own))).toEqual([[1], [1]])
  })
})

describe('formatNumbers', () => {
  it.each([
    [[], ''],
    [[7], '7'],
    [[1, 2, 3, 4], '1–4'],
    [[1, 2, 4, 9, 10], '1–2, 4, 9–10'],
  ])('writes %j as "%s"', (numbers, text) => {
    expect(formatNumbers(numbers)).toBe(text)
  })
})
