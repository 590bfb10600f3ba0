import type { RouteObject } from 'react-router'

export const distributionsRoutes: RouteObject[] = [
  {
    path: 'distributions',
    lazy: async () => ({ Component: (await import('./distributions-page.tsx')).DistributionsPage }),
  },
  {
    path: 'distributions/:month',
    lazy: async () => ({ Component: (await import('./distribution-page.tsx')).DistributionPage }),
  },
]
