import { z } from 'zod'

// zod compiles schemas with `new Function` where it may; the content security policy forbids that, and the mere
// attempt is reported in the console. Schemas decide when they are made, so this module must be loaded first.
z.config({ jitless: true })
