export type AudioFormatId =
  'mp3' | 'mp2' | 'wav' | 'flac' | 'ogg-vorbis' | 'ogg-opus' | 'ogg-flac' | 'm4a' | 'aac'

/** A kind of audio file as told from its content. */
export type AudioFormat = {
  readonly id: AudioFormatId
  /** For people. */
  readonly label: string
  readonly mediaType: string
  /** The usual file name extension, without the dot. */
  readonly extension: string
}

/** Every format that is accepted, by id. */
export const AUDIO_FORMATS: { readonly [Id in AudioFormatId]: AudioFormat & { readonly id: Id } } = {
  mp3: { id: 'mp3', label: 'MP3', mediaType: 'audio/mpeg', extension: 'mp3' },
  mp2: { id: 'mp2', label: 'MPEG layer II', mediaType: 'audio/mpeg', extension: 'mp2' },
  wav: { id: 'wav', label: 'WAV', mediaType: 'audio/wav', extension: 'wav' },
  flac: { id: 'flac', label: 'FLAC', mediaType: 'audio/flac', extension: 'flac' },
  'ogg-vorbis': { id: 'ogg-vorbis', label: 'Ogg Vorbis', mediaType: 'audio/ogg', extension: 'ogg' },
  'ogg-opus': { id: 'ogg-opus', label: 'Ogg Opus', mediaType: 'audio/ogg', extension: 'opus' },
  'ogg-flac': { id: 'ogg-flac', label: 'Ogg FLAC', mediaType: 'audio/ogg', extension: 'oga' },
  m4a: { id: 'm4a', label: 'M4A (MPEG-4 audio)', mediaType: 'audio/mp4', extension: 'm4a' },
  aac: { id: 'aac', label: 'AAC (ADTS)', mediaType: 'audio/aac', extension: 'aac' },
}

const EXTENSIONS: { readonly [Id in AudioFormatId]: readonly string[] } = {
  mp3: ['mp3', 'mpga', 'mpeg'],
  mp2: ['mp2', 'mpa', 'mp3', 'mpga', 'mpeg'],
  wav: ['wav', 'wave', 'bwf', 'rf64', 'bw64'],
  flac: ['flac', 'fla'],
  'ogg-vorbis': ['ogg', 'oga'],
  'ogg-opus': ['opus', 'ogg', 'oga'],
  'ogg-flac': ['oga', 'ogg', 'flac'],
  m4a: ['m4a', 'mp4', 'm4b', 'aac'],
  aac: ['aac', 'adts'],
}

/**
 * Whether a file name's extension is one that files of this format usually carry. A name without an extension
 * claims nothing, so it agrees with everything.
 */
export function extensionMatchesFormat(fileName: string, format: AudioFormat): boolean {
  const dot = fileName.lastIndexOf('.')
  if (dot <= 0 || dot === fileName.length - 1) return true
  return EXTENSIONS[format.id].includes(fileName.slice(dot + 1).toLowerCase())
}
