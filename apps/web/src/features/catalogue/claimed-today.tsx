import { Percent } from '../../components/figures.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { WHOLE_PPM } from '../../lib/percent-text.ts'

/** What the shares valid today come to; the shape says whether something is held back. */
export function ClaimedToday({ ppm }: { ppm: number }) {
  if (ppm === 0) return <StatusTag tone="warn">Nothing</StatusTag>
  return (
    <StatusTag tone={ppm === WHOLE_PPM ? 'good' : ppm > WHOLE_PPM ? 'bad' : 'warn'}>
      <Percent ppm={ppm} decimals={4} />
    </StatusTag>
  )
}

/** The same in a sentence. */
export function ClaimedSentence({ ppm }: { ppm: number }) {
  if (ppm === WHOLE_PPM) return <>100 % is claimed today.</>
  if (ppm > WHOLE_PPM) {
    return (
      <>
        <Percent ppm={ppm} decimals={4} /> is claimed today, which is more than there is. Everything is held
        back until this is settled.
      </>
    )
  }
  return (
    <>
      <Percent ppm={ppm} decimals={4} /> is claimed today; <Percent ppm={WHOLE_PPM - ppm} decimals={4} /> is
      held back.
    </>
  )
}
