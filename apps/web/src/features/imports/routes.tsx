import type { RouteObject } from 'react-router'

export const importsRoutes: RouteObject[] = [
  { path: 'imports', lazy: async () => ({ Component: (await import('./imports-page.tsx')).ImportsPage }) },
  {
    path: 'imports/new',
    lazy: async () => ({ Component: (await import('./new-import-page.tsx')).NewImportPage }),
  },
  {
    path: 'imports/:importId',
    lazy: async () => ({ Component: (await import('./import-page.tsx')).ImportPage }),
  },
]
