import { beforeAll, describe, expect, it } from 'vitest'

import { HOUSE_RULES, type HouseRule } from './house-rules.ts'
import { readSourceFiles, type SourceFile } from './source-files.ts'

/** Files that break one rule each. */
const OFFENDERS: Readonly<Record<string, SourceFile>> = {
  'files are short enough to be read in one go': {
    path: 'packages/royalty/src/long.ts',
    text: 'let a\n'.repeat(401),
  },
  'files are named in kebab-case': { path: 'packages/royalty/src/LargestRemainder.ts', text: '' },
  'things are exported by name': { path: 'packages/royalty/src/pool.ts', text: 'export default 1\n' },
  'nothing is left unfinished': { path: 'packages/royalty/src/pool.ts', text: '// TODO: later\n' },
  'no filler stands in for text': { path: 'apps/web/src/app/page.tsx', text: '<p>Lorem ipsum</p>\n' },
  'no package registry is named': { path: 'README.md', text: 'https://registry.example.org/\n' },
  'no path of one machine is written down': { path: 'README.md', text: 'cd "/home/desk/fieldfare"\n' },
  'no check is silenced without a reason': {
    path: 'packages/royalty/src/pool.ts',
    text: '// eslint-disable-next-line no-console\n',
  },
}

/** Far below what the checkout holds; fewer would mean that the walk went wrong. */
const FEWEST_FILES = 150

let files: readonly SourceFile[]

beforeAll(async () => {
  files = await readSourceFiles()
})

function findComplaints(rule: HouseRule): readonly string[] {
  return files.flatMap((file) => rule.complaints(file).map((complaint) => `${file.path}: ${complaint}`))
}

describe('the house rules', () => {
  it('look at every file of the checkout', () => {
    expect(files.length).toBeGreaterThan(FEWEST_FILES)
    const paths = files.map((file) => file.path)
    expect(paths).toContain('package.json')
    expect(paths).toContain('.ci/run')
    expect(paths).toContain('packages/launcher/bootstrap.sh')
    expect(paths.some((path) => path.startsWith('apps/web/src/'))).toBe(true)
  })

  it.each(HOUSE_RULES)('are kept: $name', (rule) => {
    expect(findComplaints(rule)).toEqual([])
  })

  it.each(HOUSE_RULES)('notice a file that breaks: $name', (rule) => {
    const offender = OFFENDERS[rule.name]
    expect(offender === undefined ? [] : rule.complaints(offender)).toHaveLength(1)
  })
})
