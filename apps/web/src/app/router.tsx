import type { QueryClient } from '@tanstack/react-query'
import { createBrowserRouter, type RouteObject } from 'react-router'
import { authRoutes } from '../features/auth/routes.tsx'
import { homeRoutes, shellRoutes } from './feature-routes.ts'
import { NotFoundPage } from './not-found-page.tsx'
import { PageError, WholePageError } from './page-error.tsx'
import { RootLayout } from './root-layout.tsx'
import { goHome, requireSession } from './session-loaders.ts'
import { Shell } from './shell.tsx'
import { StartingPage } from './starting-page.tsx'

export function appRoutes(queryClient: QueryClient): RouteObject[] {
  return [
    {
      Component: RootLayout,
      HydrateFallback: StartingPage,
      ErrorBoundary: WholePageError,
      children: [
        ...authRoutes,
        {
          Component: Shell,
          loader: requireSession(queryClient),
          // Changing a filter in the address is no reason to ask again who is signed in.
          shouldRevalidate: () => false,
          children: [
            {
              ErrorBoundary: PageError,
              children: [
                { loader: goHome(queryClient), children: homeRoutes },
                ...shellRoutes,
                { path: '*', Component: NotFoundPage },
              ],
            },
          ],
        },
      ],
    },
  ]
}

export function createAppRouter(queryClient: QueryClient) {
  return createBrowserRouter(appRoutes(queryClient))
}
