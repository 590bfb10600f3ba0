import { join } from 'node:path'

export type Step = {
  readonly name: string
  /** A program of node_modules and its arguments, run by this very Node. */
  readonly program: string
  readonly programArguments: readonly string[]
  /** Runs with nothing beside it: it measures time, or uses both cores by itself. */
  readonly alone: boolean
  /** Where vitest writes its counts. */
  readonly countsFile?: string
}

export type StepOptions = {
  /** A throw-away directory for what the steps write. */
  readonly scratchDirectory: string
  readonly webDirectory: string
}

/** Everything `npm test` checks, cheapest first. */
export function listSteps({ scratchDirectory, webDirectory }: StepOptions): readonly Step[] {
  const check = (name: string, program: string, ...programArguments: string[]): Step => ({
    ...{ name, program, programArguments, alone: false },
  })
  const vitest = (name: string, projects: readonly string[], alone: boolean): Step => {
    const countsFile = join(scratchDirectory, `${projects.join('-')}.json`)
    return {
      name,
      program: 'vitest/vitest.mjs',
      programArguments: [
        'run',
        ...projects.flatMap((project) => ['--project', project]),
        ...['--reporter=default', '--reporter=json', `--outputFile.json=${countsFile}`],
      ],
      alone,
      countsFile,
    }
  }
  return [
    check('lint', 'eslint/bin/eslint.js', '.'),
    check('format', 'prettier/bin/prettier.cjs', '--check', '.'),
    check('types', 'typescript/bin/tsc', '-b', 'tsconfig.json'),
    check('types: web', 'typescript/bin/tsc', '-p', 'apps/web'),
    check(
      'imports',
      'dependency-cruiser/bin/dependency-cruise.mjs',
      ...['--config', '.dependency-cruiser.cjs', 'apps', 'packages', 'migrations', 'seeds', 'tests'],
    ),
    check(
      'web build',
      'vite/bin/vite.js',
      'build',
      '--outDir',
      webDirectory,
      '--emptyOutDir',
      '--logLevel',
      'warn',
    ),
    vitest('unit and web', ['unit', 'web'], false),
    vitest('integration', ['integration'], true),
    vitest('accuracy', ['accuracy'], true),
    vitest('browser', ['browser'], true),
  ]
}
