import { buffer } from 'node:stream/consumers'
import { describe, expect, it } from 'vitest'
import { csvAnswer, neutraliseFormula } from './csv.ts'

async function contentOf(rows: Iterable<{ title: string; plays: number }>): Promise<string> {
  const answer = csvAnswer(
    [
      { header: 'Title', value: (row) => row.title },
      { header: 'Plays', value: (row) => row.plays },
    ],
    rows,
    'titles.csv',
  )
  if (answer.content.kind !== 'stream') throw new Error('A CSV answer is a stream')
  return (await buffer(answer.content.stream)).toString('utf8')
}

describe('a CSV file', () => {
  it('begins with a byte-order mark and its header, also without rows', async () => {
    expect(await contentOf([])).toBe('\uFEFFTitle,Plays\r\n')
  })

  it('quotes what holds separators and keeps numbers as numbers', async () => {
    expect(await contentOf([{ title: 'One, "two"', plays: -3 }])).toBe(
      '\uFEFFTitle,Plays\r\n"One, ""two""",-3\r\n',
    )
  })

  // The list of characters is from the OWASP page on CSV injection, from memory.
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx', '\nx', '＝1'])(
    'neutralises a text that begins like a formula: %j',
    (text) => {
      expect(neutraliseFormula(text)).toBe(`'${text}`)
    },
  )

  it('leaves other texts alone', () => {
    expect(neutraliseFormula('A = B')).toBe('A = B')
    expect(neutraliseFormula('')).toBe('')
  })

  it('passes a failure of its rows on to the reader', async () => {
    function* failing(): Generator<{ title: string; plays: number }> {
      yield { title: 'First', plays: 1 }
      throw new Error('the database went away')
    }
    await expect(contentOf(failing())).rejects.toThrow('the database went away')
  })
})
