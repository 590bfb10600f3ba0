import { LaunchError } from './launch-error.ts'
import { REPOSITORY_DIRECTORY } from './repository-directory.ts'
import { runInstance } from './start/instance.ts'
import { HELP, readStartOptions } from './start/options.ts'
import { listenForStop } from './stop-signal.ts'

try {
  const options = readStartOptions(process.argv.slice(2), process.env, REPOSITORY_DIRECTORY)
  const log = (line: string): void => console.log(line)
  if (options.help) log(HELP)
  else await runInstance({ ...options, repository: REPOSITORY_DIRECTORY, signal: listenForStop(), log })
} catch (error) {
  console.error(error instanceof LaunchError ? `Fieldfare: ${error.message}` : error)
  process.exitCode = 1
}
