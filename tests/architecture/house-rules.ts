import { basename } from 'node:path'

import type { SourceFile } from './source-files.ts'

export type HouseRule = {
  readonly name: string
  /** What is wrong with the file, one sentence each; empty when nothing is. */
  readonly complaints: (file: SourceFile) => readonly string[]
}

const MOST_LINES = 400
const MOST_TEST_LINES = 500

const CODE = /\.(ts|tsx|js|cjs)$/
const TEST = /\.test\.tsx?$/
const KEBAB_CASE = /^[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9-]+)*$/

/** A time stamp and the effect in snake case, as the knex command line names them. */
const MIGRATION = /(^|\/)migrations\/\d{14}_[a-z0-9]+(_[a-z0-9]+)*\.ts$/

/** Named by the tools that look for them. */
const NAMED_BY_TOOLS = /^(\.[a-z.-]+|[A-Z]+\.md|LICENSE|Dockerfile)$/

/** Configuration of tools, which ask for it, and lazily loaded routes. */
const MAY_EXPORT_DEFAULT =
  /(^|\/)(vite\.config\.ts|knexfile\.ts|eslint\.config\.js)$|^apps\/web\/src\/.*\/routes\/.*\.tsx$/

/** The rules have to spell what they forbid. */
const SPELLS_THE_RULES = /^tests\/architecture\//

const UNFINISHED = /\b(TODO|FIXME|HACK)\b/
const FILLER = /lorem ipsum|coming soon|not implemented/i
const REGISTRY_HOSTS = /\b(registry|deb|pypi|index)\.[a-z0-9-]+\.(org|com|net|io)\b/
/** A home or work directory of one particular machine; /tmp, /var and /usr are the same on all. */
const MACHINE_PATHS = /(^|[\s'"`(=])\/(work|home|root|Users|mnt)\/[\w.-]/
const SILENCED = /@ts-(ignore|nocheck)|eslint-disable(?!.* -- )/

export const HOUSE_RULES: readonly HouseRule[] = [
  {
    name: 'files are short enough to be read in one go',
    complaints: ({ path, text }) => {
      if (!CODE.test(path)) return []
      const lineCount = text.trimEnd().split('\n').length
      const most = TEST.test(path) ? MOST_TEST_LINES : MOST_LINES
      return lineCount > most ? [`has ${lineCount} lines; ${most} is the most`] : []
    },
  },
  {
    name: 'files are named in kebab-case',
    complaints: ({ path }) => {
      const name = basename(path)
      return KEBAB_CASE.test(name) || NAMED_BY_TOOLS.test(name) || MIGRATION.test(path)
        ? []
        : ['is not named in kebab-case']
    },
  },
  {
    name: 'things are exported by name',
    complaints: ({ path, text }) =>
      CODE.test(path) && !MAY_EXPORT_DEFAULT.test(path) && /^export default\b/m.test(text)
        ? ['exports a default']
        : [],
  },
  forbidText('nothing is left unfinished', UNFINISHED),
  forbidText('no filler stands in for text', FILLER),
  forbidText('no package registry is named', REGISTRY_HOSTS),
  forbidText('no path of one machine is written down', MACHINE_PATHS),
  forbidText('no check is silenced without a reason', SILENCED),
]

function forbidText(name: string, pattern: RegExp): HouseRule {
  return {
    name,
    complaints: ({ path, text }) => {
      if (SPELLS_THE_RULES.test(path)) return []
      return text.split('\n').flatMap((line, index) => {
        const found = pattern.exec(line)
        return found === null ? [] : [`line ${index + 1} says ${JSON.stringify(found[0].trim())}`]
      })
    },
  }
}
