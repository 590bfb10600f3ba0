import {
  listAuditEvents,
  listCatalogueImports,
  listDetections,
  listDisputes,
  listDistributions,
  listInbox,
  listLogs,
  listParties,
  listPlays,
  listRecordings,
  listStatements,
  listStations,
  listUsers,
  listWorks,
  getSystemHealth,
  type Endpoint,
  type Role,
} from '@fieldfare/contracts'
import {
  AudioLines,
  BookOpenText,
  CalendarRange,
  Disc3,
  FileInput,
  FileText,
  HeartPulse,
  History,
  Inbox,
  ListMusic,
  RadioTower,
  Scale,
  Split,
  Users,
  UsersRound,
  Waves,
  type LucideIcon,
} from 'lucide-react'

export type NavigationItem = { to: string; label: string; icon: LucideIcon }
export type NavigationGroup = { label: string; items: readonly NavigationItem[] }

type Entry = NavigationItem & { open: readonly Role[]; onlyWithLocalInbox?: boolean }

/** A page is in the menu of those who may read its list; the contract is the one place that says who. */
function readersOf(endpoint: Endpoint): readonly Role[] {
  return typeof endpoint.access === 'string' ? [] : endpoint.access
}

/** People work from lists of their own: the parties of a publisher come with every statement. */
function without(roles: readonly Role[], ...left: readonly Role[]): readonly Role[] {
  return roles.filter((role) => !left.includes(role))
}

const groups: readonly { label: string; entries: readonly Entry[] }[] = [
  {
    label: 'Airtime',
    entries: [
      { to: '/', label: 'Month', icon: CalendarRange, open: ['clerk', 'auditor'] },
      { to: '/stations', label: 'Stations', icon: RadioTower, open: readersOf(listStations) },
      { to: '/logs', label: 'Station logs', icon: AudioLines, open: readersOf(listLogs) },
      { to: '/detections', label: 'Detections', icon: Waves, open: readersOf(listDetections) },
      { to: '/plays', label: 'Plays', icon: ListMusic, open: readersOf(listPlays) },
    ],
  },
  {
    label: 'Catalogue',
    entries: [
      { to: '/recordings', label: 'Recordings', icon: Disc3, open: readersOf(listRecordings) },
      { to: '/works', label: 'Works', icon: BookOpenText, open: readersOf(listWorks) },
      { to: '/parties', label: 'Parties', icon: UsersRound, open: without(readersOf(listParties), 'admin') },
      { to: '/imports', label: 'Imports', icon: FileInput, open: readersOf(listCatalogueImports) },
    ],
  },
  {
    label: 'Money',
    entries: [
      { to: '/distributions', label: 'Distributions', icon: Split, open: readersOf(listDistributions) },
      { to: '/statements', label: 'Statements', icon: FileText, open: readersOf(listStatements) },
      { to: '/disputes', label: 'Disputes', icon: Scale, open: readersOf(listDisputes) },
    ],
  },
  {
    label: 'Administration',
    entries: [
      { to: '/users', label: 'Users', icon: Users, open: readersOf(listUsers) },
      { to: '/system', label: 'System', icon: HeartPulse, open: readersOf(getSystemHealth) },
      { to: '/inbox', label: 'Inbox', icon: Inbox, open: readersOf(listInbox), onlyWithLocalInbox: true },
      { to: '/audit-trail', label: 'Audit trail', icon: History, open: readersOf(listAuditEvents) },
    ],
  },
]

/** The menu of a role. Hiding is courtesy; the server refuses what is not allowed. */
export function navigationFor(role: Role, hasLocalInbox: boolean): NavigationGroup[] {
  return groups
    .map(({ label, entries }) => ({
      label,
      items: entries.filter(
        (entry) => entry.open.includes(role) && (hasLocalInbox || entry.onlyWithLocalInbox !== true),
      ),
    }))
    .filter((group) => group.items.length > 0)
}

/** Where each role starts the day. */
export const homeByRole = {
  uploader: '/logs',
  clerk: '/',
  publisher: '/statements',
  auditor: '/',
  admin: '/system',
} as const satisfies Record<Role, string>
