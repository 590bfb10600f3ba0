import { resolve } from 'node:path'

/** The root of the checkout this file belongs to. */
export const REPOSITORY_DIRECTORY = resolve(import.meta.dirname, '../../..')
