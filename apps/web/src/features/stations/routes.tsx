import type { RouteObject } from 'react-router'

export const stationsRoutes: RouteObject[] = [
  { path: 'stations', lazy: async () => ({ Component: (await import('./stations-page.tsx')).StationsPage }) },
  {
    path: 'stations/new',
    lazy: async () => ({ Component: (await import('./station-edit-page.tsx')).NewStationPage }),
  },
  {
    path: 'stations/:stationId',
    lazy: async () => ({ Component: (await import('./station-page.tsx')).StationPage }),
  },
  {
    path: 'stations/:stationId/edit',
    lazy: async () => ({ Component: (await import('./station-edit-page.tsx')).EditStationPage }),
  },
  {
    path: 'stations/:stationId/licences/new',
    lazy: async () => ({ Component: (await import('./licence-page.tsx')).NewLicencePage }),
  },
  {
    path: 'stations/:stationId/licences/:licenceId',
    lazy: async () => ({ Component: (await import('./licence-page.tsx')).EditLicencePage }),
  },
  {
    path: 'stations/:stationId/days/:day',
    lazy: async () => ({ Component: (await import('./station-day-page.tsx')).StationDayPage }),
  },
]
