import type { Role } from '@fieldfare/contracts'
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { render } from '@testing-library/react'
import type { ReactNode } from 'react'
import { createMemoryRouter, Outlet, RouterProvider, type RouteObject } from 'react-router'
import { ToastArea } from '../components/toast-area.tsx'
import { sessionQuery } from '../lib/session.ts'
import { SocietyContext } from '../lib/society.tsx'
import { sessionOf } from './session-fixture.ts'

export type RenderOptions = {
  /** Where the test starts. */
  at?: string
  role?: Role
}

/** Draws routes as the application would for somebody signed in, without the shell around them. */
export function renderRoutes(routes: RouteObject[], { at = '/', role = 'clerk' }: RenderOptions = {}) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } })
  const session = sessionOf(role)
  queryClient.setQueryData(sessionQuery().queryKey, session)
  function Frame() {
    return (
      <SocietyContext value={session.society}>
        <Outlet />
        <ToastArea />
      </SocietyContext>
    )
  }
  const router = createMemoryRouter(
    [{ Component: Frame, HydrateFallback: () => null, children: [...routes, { path: '*', element: null }] }],
    { initialEntries: [at] },
  )
  const view = render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  )
  return { ...view, router, queryClient }
}

/** Draws one element on a page of its own. */
export function renderElement(element: ReactNode, options: RenderOptions = {}) {
  return renderRoutes([{ path: new URL(options.at ?? '/', 'http://page').pathname, element }], options)
}
