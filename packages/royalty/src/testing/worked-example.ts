import { type DistributionInput } from '../distribution/input.ts'
import { licence, month, play, share } from './months.ts'

/**
 * A month worked out by hand.
 *
 * Fee 100.00. Administration 12.5 % = 12.50, social 2 % = 2.00, net 85.50.
 * Works 62 % = 53.01, recordings 38 % = 32.49. Plays of 210, 180 and 15 s: 405 s.
 *
 * Works, 5301 cents: work-1 5301 × 210 ÷ 405 = 2748.67, work-2 5301 × 180 ÷ 405 = 2356.00, no work 196.33;
 * whole cents 2748 + 2356 + 196 = 5300, so the last cent goes to work-1: 2749, 2356, 196.
 * - work-1: halves of 2749 are 1374.5 twice; the cent goes to the smaller identifier: a 1375, b 1374.
 * - work-2: a has 66.6667 %: 1570.67; unclaimed 785.33; the cent goes to a: a 1571, held back 785.
 *
 * Recordings, 3249 cents: 1684.67, 1444.00, 120.33; the last cent goes to recording-1: 1685, 1444, 120.
 * - recording-1: all to c. recording-2: c 60 % and d 50 % are over-claimed, held back. recording-3: no shares.
 *
 * Attributed: a 2946, b 1374, c 1685 = 6005. Held back: 196 + 785 + 1444 + 120 = 2545. Together 8550.
 */
export const worked: DistributionInput = month({
  deductions: [
    { code: 'administration', label: 'Administration', ratePpm: 125_000 },
    { code: 'social', label: 'Social and cultural purposes', ratePpm: 20_000 },
  ],
  licences: [licence({ worksPartPpm: 620_000 })],
  plays: [
    play({ playId: 'play-1', creditedSeconds: 210 }),
    play({ playId: 'play-2', recordingId: 'recording-2', workId: 'work-2', creditedSeconds: 180 }),
    play({ playId: 'play-3', recordingId: 'recording-3', workId: null, creditedSeconds: 15 }),
  ],
  shares: [
    share({ sharePpm: 500_000 }),
    share({ partyId: 'party-b', sharePpm: 500_000 }),
    share({ subjectId: 'work-2', sharePpm: 666_667 }),
    share({ right: 'recordings', subjectId: 'recording-1', partyId: 'party-c' }),
    share({ right: 'recordings', subjectId: 'recording-2', partyId: 'party-c', sharePpm: 600_000 }),
    share({ right: 'recordings', subjectId: 'recording-2', partyId: 'party-d', sharePpm: 500_000 }),
  ],
})
