/** One forbidden import for each rule of `.dependency-cruiser.cjs`: the file it is planted in and what it imports. */
export const PLANTED_IMPORTS: Readonly<Record<string, { readonly from: string; readonly imports: string }>> =
  {
    'no-circular': { from: 'packages/audio/src/egg.ts', imports: './hen.ts' },
    resolves: { from: 'packages/audio/src/mistypes.ts', imports: './nowhere.ts' },
    'pure-no-io': { from: 'packages/royalty/src/reads-file.ts', imports: 'node:fs' },
    'pure-stands-alone': { from: 'packages/royalty/src/asks-database.ts', imports: '@fieldfare/database' },
    'packages-below-apps': {
      from: 'packages/database/src/asks-app.ts',
      imports: '../../../apps/api/src/server.ts',
    },
    'no-cross-app': { from: 'apps/web/src/asks-server.ts', imports: '../../api/src/server.ts' },
    'web-sees-contracts-only': { from: 'apps/web/src/asks-royalty.tsx', imports: '@fieldfare/royalty' },
    'web-no-node': { from: 'apps/web/src/reads-file.ts', imports: 'node:fs' },
    'api-does-no-audio': { from: 'apps/api/src/decodes.ts', imports: '@fieldfare/audio' },
    'worker-sees-domain-only': { from: 'packages/worker/src/launches.ts', imports: '@fieldfare/launcher' },
    'database-sees-contracts-only': {
      from: 'packages/database/src/computes.ts',
      imports: '@fieldfare/royalty',
    },
    'launcher-sees-database-only': { from: 'packages/launcher/src/works.ts', imports: '@fieldfare/worker' },
    'migrations-stand-alone': {
      from: 'migrations/20260101000000_shifts.ts',
      imports: '@fieldfare/contracts',
    },
    'no-cross-feature': {
      from: 'apps/api/src/features/plays/asks-logs.ts',
      imports: '../logs/logs.service.ts',
    },
    'features-below-app': {
      from: 'apps/web/src/features/plays/asks-router.ts',
      imports: '../../app/router.ts',
    },
    'routers-through-service': {
      from: 'apps/api/src/features/plays/plays.router.ts',
      imports: './plays.repository.ts',
    },
    'only-repositories-touch-knex': { from: 'apps/api/src/features/plays/plays.service.ts', imports: 'knex' },
    'package-front-door': {
      from: 'apps/api/src/forces-door.ts',
      imports: '../../../packages/royalty/src/inner.ts',
    },
  }

const PACKAGES = ['audio', 'contracts', 'database', 'fingerprint', 'launcher', 'royalty', 'worker']

/** A small tree in the product's layout: what the planted imports point at, and nothing forbidden of its own. */
export const INNOCENT_FILES: Readonly<Record<string, string>> = {
  'packages/audio/src/hen.ts': "import './egg.ts'\n",
  'packages/royalty/src/inner.ts': 'export const inner = 1\n',
  'apps/api/src/server.ts': 'export const server = 1\n',
  'apps/api/src/features/logs/logs.service.ts': 'export const logs = 1\n',
  'apps/api/src/features/plays/plays.repository.ts': 'export const plays = 1\n',
  'apps/web/src/app/router.ts': 'export const router = 1\n',
  'seeds/empty.ts': 'export const seeds = 1\n',
  'tests/empty.ts': 'export const tests = 1\n',
  'node_modules/knex/package.json': '{ "name": "knex", "version": "1.0.0", "main": "index.js" }\n',
  'node_modules/knex/index.js': 'module.exports = {}\n',
  ...Object.fromEntries(
    PACKAGES.flatMap((name) => [
      [`packages/${name}/src/index.ts`, `export const ${name} = 1\n`],
      [
        `packages/${name}/package.json`,
        `{ "name": "@fieldfare/${name}", "version": "1.0.0", "type": "module", "exports": { ".": "./src/index.ts" } }\n`,
      ],
    ]),
  ),
}

export function listPackageLinks(): readonly { readonly link: string; readonly target: string }[] {
  return PACKAGES.map((name) => ({
    link: `node_modules/@fieldfare/${name}`,
    target: `../../packages/${name}`,
  }))
}
