/** For the file dialog only; the server judges a file by what is in it. */
export const acceptedAudio = '.mp3,.wav,.flac,.ogg,.oga,.opus,.m4a,.aac'
