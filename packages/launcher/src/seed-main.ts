import { join } from 'node:path'
import { pathToFileURL } from 'node:url'

import { z } from 'zod'

type SeedDemo = (options: { readonly log: (line: string) => void }) => Promise<void>

const moduleSchema = z.object({ seedDemo: z.custom<SeedDemo>((value) => typeof value === 'function') })

const repository = z.string().parse(process.argv[2])
const loaded: unknown = await import(pathToFileURL(join(repository, 'seeds/demo/index.ts')).href)
await moduleSchema.parse(loaded).seedDemo({ log: (line) => console.log(line) })
