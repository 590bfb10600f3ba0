import { execFile } from 'node:child_process'
import { chmod, cp, mkdir, rm, symlink, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { promisify } from 'node:util'

import { REPOSITORY_DIRECTORY } from '@fieldfare/launcher'
import { beforeEach, describe, expect, it } from 'vitest'
import { z } from 'zod'

import { temporaryDirectory } from '../../support/index.ts'

const outcomeSchema = z.object({ code: z.number().default(0), stdout: z.string(), stderr: z.string() })

/** What the script needs of the system; everything else is missing from its point of view. */
const SYSTEM_PROGRAMS = ['sh', 'node', 'dirname', 'mktemp', 'tail', 'rm', 'ln']
const run = promisify(execFile)

let checkout: string
let programs: string

beforeEach(async () => {
  checkout = await temporaryDirectory('bootstrap')
  programs = join(checkout, 'programs')
  await mkdir(join(checkout, 'node_modules'), { recursive: true })
  await mkdir(programs)
  await cp(join(REPOSITORY_DIRECTORY, 'packages/launcher'), join(checkout, 'packages/launcher'), {
    recursive: true,
  })
  await writeFile(
    join(checkout, 'packages/launcher/src/start.ts'),
    'console.log("started", process.argv[2])\n',
  )
  await writeLock('package-lock.json', '1.0.0')
  await writeLock('node_modules/.package-lock.json', '1.0.0')
  await symlink(join(REPOSITORY_DIRECTORY, 'node_modules/tsx'), join(checkout, 'node_modules/tsx'))
  for (const program of SYSTEM_PROGRAMS) {
    const { stdout } = await run('sh', ['-c', `command -v ${program}`])
    await symlink(stdout.trim(), join(programs, program))
  }
})

async function writeLock(path: string, version: string): Promise<void> {
  const lock = { packages: { '': {}, 'node_modules/station': { version, integrity: 'sha512-same' } } }
  await writeFile(join(checkout, path), JSON.stringify(lock))
}

async function writeProgram(name: string, ...lines: readonly string[]): Promise<void> {
  await writeFile(join(programs, name), ['#!/bin/sh', ...lines, ''].join('\n'))
  await chmod(join(programs, name), 0o755)
}

async function installAll(): Promise<void> {
  for (const name of ['redis-server', 'ffmpeg', 'chromium', 'pdftotext', 'espeak-ng'])
    await writeProgram(name)
}

async function bootstrap(...commandArguments: readonly string[]): Promise<z.infer<typeof outcomeSchema>> {
  const script = join(checkout, 'packages/launcher/bootstrap.sh')
  const outcome: unknown = await run('sh', [script, ...commandArguments], { env: { PATH: programs } }).catch(
    (error: unknown) => error,
  )
  return outcomeSchema.parse(outcome)
}

describe('bootstrap.sh', () => {
  it('names the missing Debian packages in one line when an ordinary user starts it', async () => {
    await writeProgram('id', 'echo 1000')
    const { code, stderr } = await bootstrap('start')
    expect(code).toBe(1)
    expect(stderr).toBe(
      'Fieldfare: these Debian packages are missing: redis-server ffmpeg (as root: apt-get install redis-server ffmpeg)\n',
    )
  })

  it('asks for the browser and the PDF reader only where the tests need them', async () => {
    await writeProgram('id', 'echo 1000')
    expect((await bootstrap('test')).stderr).toContain('redis-server ffmpeg chromium poppler-utils (as root')
  })

  it('installs what is missing when root starts it, renewing the package list when that is stale', async () => {
    await writeProgram('id', 'echo 0')
    await writeProgram(
      'apt-get',
      'for word; do last=$word; done',
      `echo "$*" >> ${checkout}/apt.log`,
      `if [ "$last" = update ]; then ln -s ${programs}/sh ${checkout}/updated; exit 0; fi`,
      `[ -e ${checkout}/updated ] || exit 100`,
    )
    const { code, stdout } = await bootstrap('start', 'now')
    expect(code).toBe(0)
    expect(stdout).toContain('Installing the Debian packages redis-server ffmpeg espeak-ng')
    expect(stdout).toContain('started now')
  })

  it('says so in one line when root cannot install them', async () => {
    await writeProgram('id', 'echo 0')
    await writeProgram('apt-get', 'exit 100')
    const { code, stderr } = await bootstrap('start')
    expect(code).toBe(1)
    expect(stderr).toBe('Fieldfare: these Debian packages could not be installed: redis-server ffmpeg\n')
  })

  it('installs npm packages when a version differs from the lock file, and only then', async () => {
    await installAll()
    await writeProgram('npm', 'echo "npm $*"')
    expect((await bootstrap('start')).stdout).not.toContain('npm ci')
    await writeLock('package-lock.json', '1.0.1')
    expect((await bootstrap('start')).stdout).toContain('npm ci')
    await rm(join(checkout, 'node_modules/.package-lock.json'))
    expect((await bootstrap('start')).stdout).toContain('npm ci')
  })

  it('refuses another version of Node', async () => {
    await rm(join(programs, 'node'))
    await writeProgram('node', 'echo v22.1.0')
    const { code, stderr } = await bootstrap('start')
    expect(code).toBe(1)
    expect(stderr).toBe('Fieldfare: Node 20 is needed; this is v22.1.0.\n')
  })
})
