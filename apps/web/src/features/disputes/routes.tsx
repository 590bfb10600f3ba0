import type { RouteObject } from 'react-router'

export const disputesRoutes: RouteObject[] = [
  { path: 'disputes', lazy: async () => ({ Component: (await import('./disputes-page.tsx')).DisputesPage }) },
  {
    path: 'disputes/:disputeId',
    lazy: async () => ({ Component: (await import('./dispute-page.tsx')).DisputePage }),
  },
]
