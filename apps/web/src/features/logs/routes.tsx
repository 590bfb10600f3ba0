import type { RouteObject } from 'react-router'

export const logsRoutes: RouteObject[] = [
  { path: 'logs', lazy: async () => ({ Component: (await import('./logs-page.tsx')).LogsPage }) },
  {
    path: 'logs/new',
    lazy: async () => ({ Component: (await import('./log-upload-page.tsx')).LogUploadPage }),
  },
  { path: 'logs/:logId', lazy: async () => ({ Component: (await import('./log-page.tsx')).LogPage }) },
]
