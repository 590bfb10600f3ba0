import { catalogueCsvColumns } from '@fieldfare/contracts'

export type CsvColumn = (typeof catalogueCsvColumns)[number]

/** What goes into each column, in the order of the file. */
export const columnMeanings = {
  isrc: { needed: 'Always', meaning: 'Which recording the row is about, with or without dashes.' },
  title: { needed: 'For a new recording', meaning: 'Title of the recording.' },
  artist: { needed: 'For a new recording', meaning: 'Performing artist.' },
  duration: { needed: 'No', meaning: 'Length as minutes and seconds (3:45) or in seconds (225.5).' },
  work_iswc: { needed: 'No', meaning: 'The work that is recorded, by its ISWC.' },
  work_title: {
    needed: 'For a new work',
    meaning: 'Title of the work. A share in a work needs the work named in its row.',
  },
  right: { needed: 'For a share', meaning: 'works or recordings: what the share is in.' },
  party_ipi: { needed: 'For a share, or the name', meaning: 'IPI name number of the party.' },
  party_name: { needed: 'For a share, or the IPI', meaning: 'Name of the party.' },
  share_percent: {
    needed: 'For a share',
    meaning: 'Percentage with at most four decimals, such as 33.3333.',
  },
  valid_from: { needed: 'For a share', meaning: 'First day of the share, as year-month-day (2026-01-31).' },
  valid_to: { needed: 'No', meaning: 'Last day of the share; empty for open-ended.' },
} as const satisfies Record<CsvColumn, { needed: string; meaning: string }>

/** An empty file with the right first line; the byte order mark lets spreadsheets see that it is UTF-8. */
export function emptyTemplate(): Blob {
  return new Blob([`\uFEFF${catalogueCsvColumns.join(',')}\r\n`], { type: 'text/csv;charset=utf-8' })
}
