import { rightLabels, type DistributionView } from '@fieldfare/contracts'
import type { ReactNode } from 'react'
import { Count, Percent } from '../../components/figures.tsx'
import { Money } from '../../components/money.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { classNames } from '../../lib/class-names.ts'
import { formatHours } from '../../lib/format.ts'
import { deductionColumns, sumMinor } from './station-sums.ts'

type StationPart = DistributionView['stations'][number]

/** From each station's fee to what was allocated and held back, every column summed. */
export function StationMoney({ view }: { view: DistributionView }) {
  return (
    <div className="grid gap-8">
      <FeeTable view={view} />
      <PoolTable view={view} />
    </div>
  )
}

function Ledger({ caption, children }: { caption: string; children: ReactNode }) {
  return (
    <ScrollRegion label={caption}>
      <table className="w-full text-[0.95rem] whitespace-nowrap [&_td]:px-3 [&_td]:py-1.5 [&_th]:px-3 [&_th]:py-1.5">
        <caption className="pb-2 text-left font-serif text-lg">{caption}</caption>
        {children}
      </table>
    </ScrollRegion>
  )
}

function Head({ columns }: { columns: readonly { header: string; isFigure: boolean }[] }) {
  return (
    <thead>
      <tr className="border-b border-ink">
        {columns.map(({ header, isFigure }) => (
          <th
            key={header}
            scope="col"
            className={classNames('align-bottom whitespace-normal', isFigure ? 'text-right' : 'text-left')}
          >
            {header}
          </th>
        ))}
      </tr>
    </thead>
  )
}

function StationName({ station }: Pick<StationPart, 'station'>) {
  return (
    <>
      <TextLink to={`/stations/${station.id}`}>{station.name}</TextLink>
      <span className="figures text-slate"> {station.callName}</span>
    </>
  )
}

function AmountCell({ minor }: { minor: string | bigint }) {
  return (
    <td className="text-right">
      <Money amountMinor={minor} signed />
    </td>
  )
}

function FeeTable({ view: { stations } }: { view: DistributionView }) {
  const deductions = deductionColumns(stations)
  const head = [
    { header: 'Station', isFigure: false },
    { header: 'Logs held', isFigure: true },
    { header: 'Licence fee', isFigure: true },
    ...deductions.map(({ label }) => ({ header: label, isFigure: true })),
    { header: 'Net', isFigure: true },
  ]
  return (
    <Ledger caption="Fees and deductions">
      <Head columns={head} />
      <tbody>
        {stations.map((part) => (
          <tr key={part.station.id} className="border-b border-hairline">
            <th scope="row" className="text-left font-normal">
              <StationName station={part.station} />
            </th>
            <td className="text-right">
              <Coverage part={part} />
            </td>
            <AmountCell minor={part.feeMinor} />
            {deductions.map(({ key }) => (
              <AmountCell key={key} minor={-deductionOf(part, key)} />
            ))}
            <AmountCell minor={part.netMinor} />
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr className="ruled-total">
          <th scope="row" colSpan={2} className="text-left">
            All stations
          </th>
          <AmountCell minor={sumMinor(stations.map(({ feeMinor }) => feeMinor))} />
          {deductions.map(({ key }) => (
            <AmountCell key={key} minor={-stations.reduce((sum, part) => sum + deductionOf(part, key), 0n)} />
          ))}
          <AmountCell minor={sumMinor(stations.map(({ netMinor }) => netMinor))} />
        </tr>
      </tfoot>
    </Ledger>
  )
}

function deductionOf(part: StationPart, key: string): bigint {
  return sumMinor(part.deductions.filter(({ code }) => code === key).map(({ amountMinor }) => amountMinor))
}

function Coverage({ part }: { part: StationPart }) {
  if (part.expectedSeconds === 0) return <span className="text-slate">No licence</span>
  return (
    <span title={`${formatHours(part.heldSeconds)} of ${formatHours(part.expectedSeconds)}`}>
      <Percent ratio={part.heldSeconds / part.expectedSeconds} />
    </span>
  )
}

const poolHead = [
  { header: 'Station', isFigure: false },
  { header: 'Right', isFigure: false },
  { header: 'Plays', isFigure: true },
  { header: 'Credited airtime', isFigure: true },
  { header: 'An hour earned', isFigure: true },
  { header: 'To payees', isFigure: true },
  { header: 'Held back', isFigure: true },
  { header: 'Pool', isFigure: true },
] as const

function PoolTable({ view: { stations } }: { view: DistributionView }) {
  const pools = stations.flatMap(({ station, pools: own }) => own.map((pool) => ({ station, ...pool })))
  return (
    <Ledger caption="Pools by right">
      <Head columns={poolHead} />
      <tbody>
        {pools.map((pool, index) => (
          <tr
            key={`${pool.station.id} ${pool.right}`}
            className={classNames(
              'border-hairline',
              pools[index + 1]?.station.id !== pool.station.id && 'border-b',
            )}
          >
            <th scope="row" className="text-left font-normal">
              <StationName station={pool.station} />
            </th>
            <td>{rightLabels[pool.right]}</td>
            <td className="text-right">
              <Count value={pool.plays} />
            </td>
            <td className="text-right figures">{formatHours(pool.creditedSeconds)}</td>
            {pool.perHourMinor === null ? (
              <td className="text-right text-slate">Nothing played</td>
            ) : (
              <AmountCell minor={pool.perHourMinor} />
            )}
            <AmountCell minor={pool.allocatedMinor} />
            <AmountCell minor={pool.heldBackMinor} />
            <AmountCell minor={pool.poolMinor} />
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr className="ruled-total">
          <th scope="row" colSpan={5} className="text-left">
            All pools
          </th>
          <AmountCell minor={sumMinor(pools.map(({ allocatedMinor }) => allocatedMinor))} />
          <AmountCell minor={sumMinor(pools.map(({ heldBackMinor }) => heldBackMinor))} />
          <AmountCell minor={sumMinor(pools.map(({ poolMinor }) => poolMinor))} />
        </tr>
      </tfoot>
    </Ledger>
  )
}
