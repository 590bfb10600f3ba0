import { stat } from 'node:fs/promises'
import { describe, expect, it } from 'vitest'
import { lagOf, readAll, rmsDb, sine, unevenNoise } from '../testing/signals.ts'
import { useTemporaryFolder } from '../testing/temporary-folder.ts'
import { renderDemoLog, type DemoLogItem } from './render-demo-log.ts'

const file = useTemporaryFolder()
const RATE_HZ = 8000
const first = unevenNoise(8, RATE_HZ, 1)
const second = unevenNoise(8, RATE_HZ, 2)

async function render(name: string, items: readonly DemoLogItem[], format: 'wav' | 'mp3' = 'wav') {
  const truth = await renderDemoLog(file(name), { sampleRateHz: RATE_HZ, items }, { format })
  const { samples } = await readAll(file(name), { sampleRateHz: RATE_HZ, decoder: 'audio-decode' })
  return { truth, samples }
}

describe('renderDemoLog', () => {
  it('crossfades tunes and says where each one is', async () => {
    const { truth, samples } = await render('crossfade.wav', [
      { kind: 'silence', seconds: 1 },
      { kind: 'tune', label: 'first', samples: first, fromSeconds: 2, toSeconds: 7 },
      { kind: 'tune', label: 'second', samples: () => second, overlapSeconds: 1 },
    ])
    expect(truth).toEqual({
      durationSeconds: 13,
      plays: [
        { label: 'first', startSeconds: 1, endSeconds: 6, referenceStartSeconds: 2, speed: 1 },
        { label: 'second', startSeconds: 5, endSeconds: 13, referenceStartSeconds: 0, speed: 1 },
      ],
    })
    expect(samples.length).toBe(13 * RATE_HZ)
    expect(samples.subarray(0, 7900).every((value) => value === 0)).toBe(true)
    const played = samples.subarray(2 * RATE_HZ, 4.5 * RATE_HZ)
    expect(lagOf(played, first.subarray(3 * RATE_HZ, 5.5 * RATE_HZ), 100)).toMatchObject({ lag: 0 })
    const next = samples.subarray(7 * RATE_HZ, 12 * RATE_HZ)
    expect(lagOf(next, second.subarray(2 * RATE_HZ, 7 * RATE_HZ), 100)).toMatchObject({ lag: 0 })
  })

  it('turns a tune down under speech and up again after it', async () => {
    const tune = sine(500, 10, RATE_HZ)
    const { truth, samples } = await render('talk.wav', [
      { kind: 'tune', label: 'bed', samples: tune },
      { kind: 'speech', samples: new Float32Array(3 * RATE_HZ), overlapSeconds: 6 },
    ])
    expect(truth.durationSeconds).toBe(10)
    const levelAt = (second: number) => rmsDb(samples.subarray(second * RATE_HZ, (second + 1) * RATE_HZ))
    expect(levelAt(2) - levelAt(5)).toBeCloseTo(12, 0)
    expect(levelAt(8) - levelAt(2)).toBeCloseTo(0, 1)
  })

  it('plays a tune at another speed for a correspondingly shorter time', async () => {
    const tune = sine(500, 6, RATE_HZ)
    const { truth, samples } = await render('fast.wav', [
      { kind: 'tune', label: 'fast', samples: tune, speed: 1.02 },
    ])
    expect(truth.durationSeconds).toBeCloseTo(6 / 1.02, 3)
    const wanted = sine(510, 5, RATE_HZ)
    expect(lagOf(samples.subarray(0, wanted.length), wanted, 8).fit).toBeGreaterThan(0.999)
  })

  it('never clips, however much is laid on top of each other', async () => {
    const loud = sine(300, 2, RATE_HZ).map((value) => 1.9 * value)
    const { samples } = await render('loud.wav', [
      { kind: 'tune', label: 'a', samples: loud },
      { kind: 'speech', samples: loud, overlapSeconds: 2, gain: 2 },
    ])
    expect(Math.max(...samples)).toBeLessThan(0.93)
  })

  it('writes the same bytes every time, in a lossy format too', async () => {
    const items: DemoLogItem[] = [{ kind: 'tune', label: 'a', samples: first }]
    const once = await render('once.mp3', items, 'mp3')
    const again = await render('again.mp3', items, 'mp3')
    expect(again.samples.length).toBe(once.samples.length)
    expect((await stat(file('again.mp3'))).size).toBe((await stat(file('once.mp3'))).size)
    expect(lagOf(once.samples, again.samples, 3).fit).toBeCloseTo(1, 9)
  })

  it('refuses an item that starts before the one before it, and leaves no file', async () => {
    const items: DemoLogItem[] = [
      { kind: 'tune', label: 'a', samples: first },
      { kind: 'speech', samples: sine(300, 1, RATE_HZ), overlapSeconds: 2 },
      { kind: 'tune', label: 'b', samples: second, overlapSeconds: 5 },
    ]
    await expect(render('wrong.wav', items)).rejects.toThrow(RangeError)
    await expect(stat(file('wrong.wav'))).rejects.toMatchObject({ code: 'ENOENT' })
  })
})
