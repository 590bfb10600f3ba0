import { quantile, type Score } from './scoring.ts'

/** A condition, how it went and how long its log was. */
export type ConditionResult = { readonly name: string; readonly seconds: number; readonly score: Score }

type Row = {
  readonly figure: string
  readonly measured: string
  readonly target: string
  readonly isMet: boolean
}

function percent(share: number): string {
  return `${(100 * share).toFixed(1)} %`
}

function foundShare({ found, plays }: Score): number {
  return found / Math.max(1, plays)
}

function atLeast(figure: string, share: number, target: number): Row {
  return { figure, measured: percent(share), target: `≥ ${percent(target)}`, isMet: share >= target }
}

const FOUND_TARGETS: readonly (readonly [RegExp, number])[] = [
  [/^(clean|talk-over|processed|32 kbit)/, 0.99],
  [/^(speed|tempo)/, 0.98],
  [/^5 s in speech/, 0.98],
  [/^10 s in speech/, 1],
  [/^12 dB under/, 0.6],
  [/in noise/, 0.5],
]

function foundRows(results: readonly ConditionResult[]): Row[] {
  return results.flatMap(({ name, score }) => {
    const target = FOUND_TARGETS.find(([pattern]) => pattern.test(name))
    return target
      ? [atLeast(`plays found: ${name} (${score.found}/${score.plays})`, foundShare(score), target[1])]
      : []
  })
}

function falseAlarmRows(results: readonly ConditionResult[]): Row[] {
  const unknown = results.find(({ name }) => name === 'unknown music')
  if (!unknown) return []
  const per100Hours = 360_000 / unknown.seconds
  const accepted = unknown.score.falseAccepted * per100Hours
  const review = unknown.score.falseReview * per100Hours
  const hours = (unknown.seconds / 3600).toFixed(1)
  const figure = `false detections per 100 h of unknown music (measured on ${hours} h)`
  return [
    { figure: `${figure}: accepted`, measured: accepted.toFixed(1), target: '0', isMet: accepted === 0 },
    { figure: `${figure}: to review`, measured: review.toFixed(1), target: '≤ 2', isMet: review <= 2 },
  ]
}

function summaryRows(results: readonly ConditionResult[]): Row[] {
  const whole = results.filter(({ name }) => /^(clean|talk-over|processed|32 kbit)/.test(name))
  const changed = results.filter(({ name }) => /^(speed|tempo)/.test(name))
  const sum = (list: readonly ConditionResult[], value: (score: Score) => number): number =>
    list.reduce((total, { score }) => total + value(score), 0)
  const edges = whole.flatMap(({ score }) => score.edgeErrors)
  const pieces =
    sum(results, (score) => score.inPieces) /
    Math.max(
      1,
      sum(results, (score) => score.found),
    )
  const median = quantile(edges, 0.5)
  const upper = quantile(edges, 0.95)
  return [
    ...whole.map(({ name, score }) => atLeast(`airtime of those found: ${name}`, score.airtimeShare, 0.98)),
    atLeast(
      'speed reported within 0.2 %',
      sum(changed, (score) => score.speedsRight) /
        Math.max(
          1,
          sum(changed, (score) => score.found),
        ),
      0.98,
    ),
    {
      figure: 'start and end error, median',
      measured: `${median.toFixed(2)} s`,
      target: '≤ 0.5 s',
      isMet: median <= 0.5,
    },
    {
      figure: 'start and end error, 95 %',
      measured: `${upper.toFixed(2)} s`,
      target: '≤ 2 s',
      isMet: upper <= 2,
    },
    {
      figure: 'one play in several detections',
      measured: percent(pieces),
      target: '≤ 1.0 %',
      isMet: pieces <= 0.01,
    },
    {
      figure: 'wrong detections among known music',
      measured: String(sum(results, (score) => score.falseAccepted + score.falseReview)),
      target: '0',
      isMet: sum(results, (score) => score.falseAccepted + score.falseReview) === 0,
    },
  ]
}

/** Every figure beside its target. */
export function printReport(results: readonly ConditionResult[]): void {
  const rows = [...foundRows(results), ...summaryRows(results), ...falseAlarmRows(results)]
  const width = Math.max(...rows.map(({ figure }) => figure.length))
  for (const { figure, measured, target, isMet } of rows) {
    console.log(
      `${figure.padEnd(width)}  ${measured.padStart(9)}  target ${target.padEnd(9)} ${isMet ? 'met' : 'MISSED'}`,
    )
  }
}
