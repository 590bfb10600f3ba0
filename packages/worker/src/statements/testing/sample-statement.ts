import {
  type StatementDocument,
  type StatementLine,
  type StatementPlay,
  type StatementSection,
} from '../statement-document.ts'

/** Invented names that need more than ASCII, and one that runs over several lines. */
const TITLES: readonly (readonly [title: string, creators: string])[] = [
  ['Zimní světlo', 'Řehořova Lípa'],
  ['Łąka o świcie', 'Żaneta Ćwik'],
  ['Ångström’s Lantern', 'The Søndre Øyer Æther Band'],
  ['Đường về bến sông', 'Nguyễn Thị Ẩn'],
  ['Тихая вода', 'Ольга Ёлкина'],
  ['Φως στο λιμάνι', 'Ελένη Ψαρά'],
  [
    'A Long Letter to the Lighthouse Keeper Who Never Answered but Kept the Lamp Lit Every Night of the Winter',
    'Marigold Thackeray-Okonkwo, Bartholomew Finisterre and the Choir of the Lower Harbour School',
  ],
  ['Gümüş ve ıhlamur', 'İpek Şölen'],
  ['Harbour Lights', 'Wren & Otter'],
]

function playsOf(count: number, offset: number, recordingTitle: string): readonly StatementPlay[] {
  return Array.from({ length: count }, (_, index) => {
    const serial = offset + index
    const day = (serial % 30) + 1
    const hour = (serial * 7) % 24
    const minute = (serial * 13) % 60
    const pad = (value: number): string => value.toString().padStart(2, '0')
    return {
      reference: `P-${serial.toString(16).toUpperCase().padStart(6, '0')}`,
      localStart: `2026-11-${pad(day)}T${pad(hour)}:${pad(minute)}:${pad((serial * 29) % 60)}`,
      recordingTitle,
      durationSeconds: 150 + (serial % 90) + 0.4,
      creditedSeconds: 150 + (serial % 90) + 0.4,
    }
  })
}

function lineOf(serial: number): StatementLine {
  const [title, creators] = TITLES[serial % TITLES.length] ?? ['', '']
  const right = serial % 3 === 0 ? 'works' : 'recordings'
  const plays = playsOf((serial % 4) + 1, serial * 10, title)
  return {
    title,
    creators,
    code:
      right === 'works'
        ? 'ISWC T-034.524.680-1'
        : `ISRC AA-6Q7-26-${(serial % 100_000).toString().padStart(5, '0')}`,
    right,
    creditedMs: plays.reduce((sum, play) => sum + BigInt(Math.round(play.creditedSeconds * 1000)), 0n),
    sharePpm: [1_000_000, 333_333, 500_000, 62_500][serial % 4] ?? 0,
    amountMinor: BigInt(100 + ((serial * 7919) % 9000)),
    plays,
  }
}

function sectionOf(station: number, lineCount: number): StatementSection {
  const lines = Array.from({ length: lineCount }, (_, index) => lineOf(station * 1000 + index))
  const netMinor = lines.reduce((sum, { amountMinor }) => sum + amountMinor, 0n)
  const deductionsMinor = netMinor / 6n
  return {
    stationName: ['Radio Kestrel Bay', 'Halcyon FM', 'Stanice Jeřáb', 'Loma Alta Radio'][station] ?? 'Radio',
    timeZone: station % 2 === 0 ? 'Europe/Prague' : 'Atlantic/Azores',
    grossMinor: netMinor + deductionsMinor,
    deductionsMinor,
    netMinor,
    heldSeconds: 2_592_000 - station * 86_400,
    expectedSeconds: 2_592_000,
    lines,
  }
}

/** A statement that adds up, with so many stations of so many lines. */
export function sampleStatement(
  stations: number,
  linesPerStation: number,
  overrides: Partial<StatementDocument> = {},
): StatementDocument {
  const sections = Array.from({ length: stations }, (_, station) => sectionOf(station, linesPerStation))
  const sumOf = (amounts: readonly bigint[]): bigint => amounts.reduce((sum, amount) => sum + amount, 0n)
  const lines = sections.flatMap((section) => section.lines)
  const netMinor = sumOf(sections.map((section) => section.netMinor))
  const deductedMinor = sumOf(sections.map((section) => section.deductionsMinor))
  const worksMinor = sumOf(
    lines.filter(({ right }) => right === 'works').map(({ amountMinor }) => amountMinor),
  )
  const socialMinor = deductedMinor / 8n
  return {
    societyName: 'Meridian Authors’ and Performers’ Society',
    payeeName: 'Nakladatelství Tři Řeky',
    ipiNameNumber: '00014107338',
    statementNumber: '2026-11-0042',
    status: 'issued',
    monthLabel: 'November 2026',
    firstDay: '2026-11-01',
    lastDay: '2026-11-30',
    createdAt: '2026-12-04T09:00:00Z',
    approvedOn: '2026-12-03',
    issuedOn: '2026-12-04',
    currency: 'EUR',
    ruleVersion: '2026-1',
    grossMinor: netMinor + deductedMinor,
    deductions: [
      { label: 'Administration', ratePpm: 125_000, amountMinor: deductedMinor - socialMinor },
      { label: 'Social and cultural purposes', ratePpm: 20_000, amountMinor: socialMinor },
    ],
    netMinor,
    worksMinor,
    recordingsMinor: netMinor - worksMinor,
    sections,
    holdbacks: [],
    questionUntil: '2027-09-04',
    questionContact: 'in your Fieldfare account, or by letter to the distribution desk',
    ...overrides,
  }
}
