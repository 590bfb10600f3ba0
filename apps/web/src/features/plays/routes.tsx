import type { RouteObject } from 'react-router'

export const playsRoutes: RouteObject[] = [
  { path: 'plays', lazy: async () => ({ Component: (await import('./plays-page.tsx')).PlaysPage }) },
]
