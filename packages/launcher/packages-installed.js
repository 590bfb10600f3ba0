import { existsSync, readFileSync } from 'node:fs'
import { exit } from 'node:process'

/*
 * Exits with 0 when node_modules holds exactly what package-lock.json asks for, else with 1. Versions are compared
 * rather than file times, which a checkout or a copy sets at will. Plain JavaScript: it runs before anything is installed.
 */
const INSTALLED = 'node_modules/.package-lock.json'

exit(isInstalled() ? 0 : 1)

function isInstalled() {
  const installed = readPackages(INSTALLED)
  if (installed === undefined) return false
  return Object.entries(readPackages('package-lock.json') ?? {}).every(([path, wanted]) => {
    if (!path.includes('node_modules/')) return true
    const present = installed[path]
    // npm leaves out optional packages made for other systems.
    if (present === undefined)
      return wanted.optional === true || wanted.devOptional === true || wanted.peer === true
    // Those in a workspace's own folder are looked for, since the record is kept in the root's folder only.
    if (!path.startsWith('node_modules/') && !existsSync(path)) return false
    return present.version === wanted.version && present.integrity === wanted.integrity
  })
}

function readPackages(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8')).packages
  } catch {
    return undefined
  }
}
