import { AUDIO_FORMATS, type AudioFormat } from './audio-format.ts'
import { hasText } from './bytes.ts'
import { findFirstFrame, id3v2Bytes } from './mpeg-audio.ts'
import { oggCodecOf } from './ogg.ts'

/** Bytes from the start of a file that are always enough for {@link sniffAudio}. */
export const SNIFF_BYTES = 65_536

/**
 * Tells the kind of audio from the first bytes of a file (64 KiB are enough), never from its name. Null when it is not
 * audio that can be read here; a text file called .mp3 is null.
 */
export function sniffAudio(head: Uint8Array): AudioFormat | null {
  let start = 0
  for (let tag = id3v2Bytes(head, 0); tag > 0; tag = id3v2Bytes(head, start)) start += tag
  // A tag longer than what we were given (cover art): only MP3 files commonly begin so.
  if (start >= head.length) return start > 0 ? AUDIO_FORMATS.mp3 : null

  if (hasText(head, start, 'fLaC')) return AUDIO_FORMATS.flac
  if (hasText(head, start, 'OggS')) {
    const codec = oggCodecOf(head.subarray(start))
    return codec ? AUDIO_FORMATS[codec] : null
  }
  const isRiff = ['RIFF', 'RF64', 'BW64'].some((id) => hasText(head, start, id))
  if (isRiff) return hasText(head, start + 8, 'WAVE') ? AUDIO_FORMATS.wav : null
  if (hasText(head, start + 4, 'ftyp')) return AUDIO_FORMATS.m4a

  const found = findFirstFrame(head, start)
  return found ? AUDIO_FORMATS[found.frame.codec] : null
}
