import { getDetectionClip, type ClipSource } from '@fieldfare/contracts'
import { useRef, useState, type RefObject } from 'react'
import { callApi } from '../../lib/api-client.ts'

const LARGEST_DRIFT_SECONDS = 0.06

export type PlayState = 'still' | 'fetching' | 'playing'
export type ClipFailures = Partial<Record<ClipSource, unknown>>

export type StepPlayers = {
  state: PlayState
  position: number
  failures: ClipFailures
  refs: Record<ClipSource, RefObject<HTMLAudioElement | null>>
  start: () => Promise<void>
  stop: () => void
  seek: (seconds: number) => void
  handleTime: () => void
  handleEnd: () => void
}

function whenReady(audio: HTMLAudioElement): Promise<void> {
  if (audio.readyState >= HTMLMediaElement.HAVE_FUTURE_DATA) return Promise.resolve()
  return new Promise((resolve, reject) => {
    audio.addEventListener('canplay', () => resolve(), { once: true })
    audio.addEventListener('error', () => reject(new Error('The clip could not be played.')), { once: true })
    audio.preload = 'auto'
    audio.load()
  })
}

/** An audio element says only that it failed; asking for the clip once more tells why, in words. */
async function reasonOf(detectionId: string, source: ClipSource, fromSeconds: number): Promise<unknown> {
  try {
    await callApi(getDetectionClip, { params: { detectionId, source }, query: { fromSeconds } })
    return new Error('The clip is there, but this browser could not play it.')
  } catch (error) {
    return error
  }
}

/** Two clips that begin at the same moment, played as one; the log leads, the reference follows. */
export function useStepPlayers(
  detectionId: string,
  fromSeconds: number,
  sources: readonly ClipSource[],
): StepPlayers {
  const log = useRef<HTMLAudioElement>(null)
  const reference = useRef<HTMLAudioElement>(null)
  const refs = { log, reference }
  const wanted = useRef(false)
  const [state, setState] = useState<PlayState>('still')
  const [position, setPosition] = useState(0)
  const [failures, setFailures] = useState<ClipFailures>({})

  const elements = () => [log.current, reference.current].filter((audio) => audio !== null)
  const leader = () => (log.current?.error === null ? log.current : reference.current)

  const prepare = async (source: ClipSource) => {
    const audio = refs[source].current
    if (audio === null) return null
    try {
      await whenReady(audio)
      return audio
    } catch {
      // The element's own error says nothing a person could use; the server's answer does.
      const reason = await reasonOf(detectionId, source, fromSeconds)
      setFailures((known) => ({ ...known, [source]: reason }))
      return null
    }
  }

  const stop = () => {
    wanted.current = false
    for (const audio of elements()) audio.pause()
    setState('still')
  }

  // Somebody may have pressed pause while the clips were fetched.
  const isWanted = () => wanted.current

  const start = async () => {
    wanted.current = true
    setFailures({})
    setState('fetching')
    const ready = (await Promise.all(sources.map(prepare))).filter((audio) => audio !== null)
    const [first] = ready
    if (!isWanted() || first === undefined) {
      setState('still')
      return
    }
    for (const audio of ready) audio.currentTime = first.currentTime
    try {
      await Promise.all(ready.map((audio) => audio.play()))
      setState('playing')
    } catch {
      // Paused again before the sound began, or the browser wants another press first: both leave it still.
      stop()
    }
  }

  const seek = (seconds: number) => {
    for (const audio of elements()) audio.currentTime = seconds
    setPosition(seconds)
  }

  const handleTime = () => {
    const leading = leader()
    if (leading === null) return
    setPosition(leading.currentTime)
    const following = reference.current
    if (following === null || following === leading || following.paused) return
    if (Math.abs(following.currentTime - leading.currentTime) > LARGEST_DRIFT_SECONDS) {
      following.currentTime = leading.currentTime
    }
  }

  const handleEnd = () => {
    stop()
    seek(0)
  }

  return { state, position, failures, refs, start, stop, seek, handleTime, handleEnd }
}
