import type { RouteObject } from 'react-router'

export const detectionsRoutes: RouteObject[] = [
  {
    path: 'detections',
    lazy: async () => ({ Component: (await import('./detections-page.tsx')).DetectionsPage }),
  },
  {
    path: 'detections/:detectionId',
    lazy: async () => ({ Component: (await import('./detection-page.tsx')).DetectionPage }),
  },
]
