import { resolve } from 'node:path'
import { parseArgs } from 'node:util'

import { LaunchError } from '../launch-error.ts'

export type StartOptions = {
  readonly dataDirectory: string
  /** The first port tried for the API. */
  readonly preferredPort: number
  readonly withDemo: boolean
  readonly help: boolean
}

export const HELP = `Usage: npm start -- [options]
  --data-dir DIRECTORY  keep everything there instead of in .data (also FIELDFARE_DATA_DIR)
  --port NUMBER         first port tried for the web address, 4300 unless given (also FIELDFARE_API_PORT)
  --without-demo        start empty: no demonstration data`

const DEFAULT_PORT = '4300'

/** @throws {@link LaunchError} when an option is unknown or wrong */
export function readStartOptions(
  commandLine: readonly string[],
  environment: NodeJS.ProcessEnv,
  repository: string,
): StartOptions {
  const { values } = parse(commandLine)
  const port = Number(values.port ?? environment['FIELDFARE_API_PORT'] ?? DEFAULT_PORT)
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new LaunchError('The port must be a whole number from 1 to 65535.')
  }
  const directory = values['data-dir'] ?? environment['FIELDFARE_DATA_DIR'] ?? '.data'
  return {
    dataDirectory: resolve(repository, directory),
    preferredPort: port,
    withDemo: values['without-demo'] !== true,
    help: values.help === true,
  }
}

function parse(commandLine: readonly string[]) {
  try {
    return parseArgs({
      args: [...commandLine],
      options: {
        'data-dir': { type: 'string' },
        port: { type: 'string' },
        'without-demo': { type: 'boolean' },
        help: { type: 'boolean' },
      },
    })
  } catch (error) {
    throw new LaunchError(`${error instanceof Error ? error.message : 'Unknown option.'}\n${HELP}`)
  }
}
