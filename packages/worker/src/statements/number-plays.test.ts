import { describe, expect, it } from 'vitest'
import { formatNumbers, numberPlays } from './number-plays.ts'
import { sampleStatement } from './testing/sample-statement.ts'

describe('numberPlays', () => {
  it('numbers every play from 1, station by station, within it by recording and then by time', () => {
    const statement = sampleStatement(2, 12)
    const { plays } = numberPlays(statement)
    const places = plays.map(({ number, stationName, recordingTitle, localStart }) => {
      const station = statement.sections.findIndex((section) => section.stationName === stationName)
      return { number, place: `${station} ${recordingTitle} ${localStart}` }
    })
    expect(places.map(({ number }) => number)).toEqual(plays.map((_, index) => index + 1))
    expect(places.map(({ place }) => place)).toEqual(places.map(({ place }) => place).sort())
    const count = statement.sections.flatMap(({ lines }) => lines.flatMap((line) => line.plays)).length
    expect(plays).toHaveLength(count)
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

  it('stops before a list too long to be of use on paper', () => {
    const odd = Array.from({ length: 100 }, (_, index) => 2 * index + 1)
    expect(formatNumbers(odd)).toMatch(/^1, 3, 5, .*, 79 and more; the CSV file lists all$/)
  })
})
