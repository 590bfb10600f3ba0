import type { RouteObject } from 'react-router'

export const accountRoutes: RouteObject[] = [
  { path: 'account', lazy: async () => ({ Component: (await import('./account-page.tsx')).AccountPage }) },
]
