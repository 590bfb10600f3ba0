import type { RouteObject } from 'react-router'

export const catalogueRoutes: RouteObject[] = [
  {
    path: 'recordings',
    lazy: async () => ({ Component: (await import('./recordings-page.tsx')).RecordingsPage }),
  },
  {
    path: 'recordings/new',
    lazy: async () => ({ Component: (await import('./new-recording-page.tsx')).NewRecordingPage }),
  },
  {
    path: 'recordings/reference-audio',
    lazy: async () => ({ Component: (await import('./reference-audio-page.tsx')).ReferenceAudioPage }),
  },
  {
    path: 'recordings/:recordingId',
    lazy: async () => ({ Component: (await import('./recording-page.tsx')).RecordingPage }),
  },
  { path: 'works', lazy: async () => ({ Component: (await import('./works-page.tsx')).WorksPage }) },
  { path: 'works/new', lazy: async () => ({ Component: (await import('./new-work-page.tsx')).NewWorkPage }) },
  { path: 'works/:workId', lazy: async () => ({ Component: (await import('./work-page.tsx')).WorkPage }) },
  { path: 'parties', lazy: async () => ({ Component: (await import('./parties-page.tsx')).PartiesPage }) },
  {
    path: 'parties/new',
    lazy: async () => ({ Component: (await import('./new-party-page.tsx')).NewPartyPage }),
  },
  {
    path: 'parties/:partyId',
    lazy: async () => ({ Component: (await import('./party-page.tsx')).PartyPage }),
  },
]
