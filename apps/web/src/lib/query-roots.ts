/** What the keys of a subject's queries begin with, to refresh all of them after a change elsewhere. */
export const queryRoots = {
  detections: ['detections'],
  disputes: ['disputes'],
  logs: ['logs'],
  overview: ['overview'],
  plays: ['plays'],
  stations: ['stations'],
} as const
