import type { RouteObject } from 'react-router'

export const administrationRoutes: RouteObject[] = [
  { path: 'users', lazy: async () => ({ Component: (await import('./users-page.tsx')).UsersPage }) },
  { path: 'users/new', lazy: async () => ({ Component: (await import('./invite-page.tsx')).InvitePage }) },
  { path: 'users/:userId', lazy: async () => ({ Component: (await import('./user-page.tsx')).UserPage }) },
  { path: 'inbox', lazy: async () => ({ Component: (await import('./inbox-page.tsx')).InboxPage }) },
  { path: 'system', lazy: async () => ({ Component: (await import('./system-page.tsx')).SystemPage }) },
  {
    path: 'audit-trail',
    lazy: async () => ({ Component: (await import('./audit-trail-page.tsx')).AuditTrailPage }),
  },
]
