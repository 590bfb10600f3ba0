import { copyFile, mkdir, symlink, writeFile } from 'node:fs/promises'
import { dirname, join } from 'node:path'

import { REPOSITORY_DIRECTORY } from '@fieldfare/launcher'
import { beforeAll, describe, expect, it } from 'vitest'

import { temporaryDirectory } from '../support/index.ts'
import { type Cruise, cruise } from './cruise.ts'
import { INNOCENT_FILES, listPackageLinks, PLANTED_IMPORTS } from './planted-imports.ts'

const FOLDERS = ['apps', 'packages', 'migrations', 'seeds', 'tests']
const TIMEOUT_MS = 120_000

/** Well below what the repository holds, far above what a broken set-up would read. */
const FEWEST_MODULES = 150
const FEWEST_WORKSPACE_IMPORTS = 100

describe('the import rules on the real tree', () => {
  let real: Cruise

  beforeAll(async () => {
    real = await cruise(REPOSITORY_DIRECTORY, FOLDERS)
  }, TIMEOUT_MS)

  it('really read the modules of every workspace', () => {
    const ours = real.modules
      .map((module) => module.source)
      .filter((source) => !source.includes('node_modules'))
    expect(ours.length).toBeGreaterThan(FEWEST_MODULES)
    const workspaces = new Set(ours.map((source) => source.split('/').slice(0, 2).join('/')))
    for (const workspace of [
      'apps/web',
      'apps/api',
      'packages/worker',
      'packages/contracts',
      'packages/database',
    ]) {
      expect(workspaces).toContain(workspace)
    }
    expect(ours.filter((source) => source.endsWith('.tsx')).length).toBeGreaterThan(0)
  })

  it('follow imports by package name into the workspaces', () => {
    const acrossWorkspaces = real.modules.flatMap((module) =>
      module.dependencies.filter(({ resolved }) => /^packages\/[^/]+\/src\/index\.ts$/.test(resolved)),
    )
    expect(acrossWorkspaces.length).toBeGreaterThan(FEWEST_WORKSPACE_IMPORTS)
  })
})

describe('each import rule', () => {
  let planted: Cruise

  beforeAll(async () => {
    planted = await cruise(await plantForbiddenImports(), FOLDERS)
  }, TIMEOUT_MS)

  it('has a forbidden import planted for it', () => {
    const rules = planted.summary.ruleSetUsed.forbidden.map((rule) => rule.name)
    expect(Object.keys(PLANTED_IMPORTS).sort()).toEqual(rules.sort())
  })

  it.each(Object.entries(PLANTED_IMPORTS))('%s reports it', (rule, { from }) => {
    const reporters = planted.summary.violations
      .filter((violation) => violation.from === from)
      .map((violation) => violation.rule.name)
    expect(reporters).toContain(rule)
  })

  it('leaves the files alone in which nothing is planted', () => {
    const guilty = new Set(Object.values(PLANTED_IMPORTS).map(({ from }) => from))
    expect(planted.summary.violations.filter((violation) => !guilty.has(violation.from))).toEqual([])
  })
})

async function plantForbiddenImports(): Promise<string> {
  const root = await temporaryDirectory('imports')
  const planted = Object.values(PLANTED_IMPORTS).map(
    ({ from, imports }) => [from, `import '${imports}'\n`] as const,
  )
  for (const [path, content] of [...Object.entries(INNOCENT_FILES), ...planted]) {
    await mkdir(dirname(join(root, path)), { recursive: true })
    await writeFile(join(root, path), content)
  }
  for (const { link, target } of listPackageLinks()) {
    await mkdir(dirname(join(root, link)), { recursive: true })
    await symlink(target, join(root, link))
  }
  for (const file of ['.dependency-cruiser.cjs', 'tsconfig.json', 'package.json']) {
    await copyFile(join(REPOSITORY_DIRECTORY, file), join(root, file))
  }
  return root
}
