import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { monthSchema, type StationLogId } from '@fieldfare/contracts'
import { createDatabase, createStorage, readConfiguration, type Database } from '@fieldfare/database'
import { writeAudioFile } from '@fieldfare/audio'
import { insertCatalogue } from './catalogue.ts'
import { planCatalogue } from './catalogue-plan.ts'
import { closeMonth, disputeOnePlay, sendLog, signedIn, waitForLogs } from './desk.ts'
import { insertHistory } from './history.ts'
import { publisherNames, writerNames } from './invented-names.ts'
import { demoMonths } from './months.ts'
import { insertPeople, planPeople, type DemoPeople } from './people.ts'
import { addReferenceAudio, SAMPLE_RATE } from './reference-audio.ts'
import { insertSociety } from './society.ts'
import { makeStationAudio } from './station-audio.ts'

/** Days of the current month whose logs have come in already. */
const CURRENT_DAYS = 21
const PROGRESS_EVERY = 10

async function waitForFingerprints(database: Database, count: number): Promise<void> {
  for (;;) {
    const rows: { status: string }[] = await database('reference_audio').select('status')
    const settled = rows.filter(({ status }) => status === 'ready' || status === 'failed')
    if (settled.length >= count) return
    await new Promise((resolve) => setTimeout(resolve, 300))
  }
}

async function writeSignIns(people: DemoPeople): Promise<void> {
  const directory = process.env['FIELDFARE_DATA_DIR'] ?? '.data'
  const signIns = people.all.map(({ role, email, password }) => ({ role, email, password }))
  await writeFile(join(directory, 'demo-sign-ins.json'), JSON.stringify(signIns, null, 2), { mode: 0o600 })
}

/**
 * Fills an empty installation with an invented society: two months of play history, a catalogue of generated music,
 * recordings of broadcasts that really go through upload, worker and detection, one month closed and paid out.
 * API and worker must be running.
 */
export async function seedDemo({ log }: { log: (line: string) => void }): Promise<void> {
  const configuration = readConfiguration(process.env)
  const database = createDatabase({
    databaseUrl: configuration.databaseUrl,
    applicationName: 'fieldfare-seed',
  })
  const storage = createStorage(configuration.storage)
  await mkdir(configuration.cacheDirectory, { recursive: true })
  const directory = await mkdtemp(join(configuration.cacheDirectory, 'demo-'))
  try {
    const address = `http://${configuration.apiHost}:${configuration.apiPort}`
    const months = demoMonths(new Date())
    const [history, current] = [months.history, months.current].map((month) =>
      monthSchema.parse(month.toFormat('yyyy-LL')),
    )
    if (!history || !current) throw new Error('The demo needs two months')
    const people = planPeople()
    const plan = planCatalogue()
    log(
      `Catalogue: ${plan.recordings.length} recordings, ${plan.works.length} works, ${plan.parties.length} parties`,
    )
    const stations = await insertSociety(database, months)
    const catalogue = await insertCatalogue(database, plan, months)
    const clerkId = await insertPeople(database, people, {
      stationIds: stations.map(({ id }) => id),
      partyIds: [publisherNames[0], writerNames[1]].flatMap((name) => catalogue.partyIds.get(name) ?? []),
    })
    const { recordings } = catalogue
    const lengthsMs = await addReferenceAudio({
      database,
      storage,
      recordings,
      uploadedBy: clerkId,
      directory,
      onProgress(done) {
        if (done % PROGRESS_EVERY === 0) log(`Music: ${done} of ${recordings.length} recordings made`)
      },
    })
    const base = { recordings, lengthsMs, uploadedBy: clerkId }
    const days = months.history.daysInMonth
    const plays =
      (await insertHistory(database, stations, { ...base, month: months.history, days })) +
      (await insertHistory(database, stations, { ...base, month: months.current, days: CURRENT_DAYS }))
    log(`History: ${plays} plays in two months`)
    await waitForFingerprints(database, recordings.length)
    log('Fingerprints: ready')
    const uploader = await signedIn(address, people.uploader)
    const logIds: StationLogId[] = []
    await makeStationAudio({
      stations,
      recordings,
      months,
      directory,
      async onLog({ station, path, start }) {
        logIds.push(
          await sendLog(uploader, { stationId: station.id, path, start, timeZone: station.timeZone }),
        )
        await rm(path)
        log(`Station logs: ${station.name}, 45 minutes, sent to the worker`)
      },
    })
    const silent = stations[0]
    if (silent) {
      const path = join(directory, `${silent.callName}_silent.wav`)
      await writeAudioFile(path, new Float32Array(SAMPLE_RATE * 120), SAMPLE_RATE, { format: 'wav' })
      const start = months.current.set({ day: 25, hour: 8 }).setZone(silent.timeZone, { keepLocalTime: true })
      if (start.isValid)
        logIds.push(await sendLog(uploader, { stationId: silent.id, path, start, timeZone: silent.timeZone }))
    }
    log(`Closing ${history}: calculating, approving, issuing statements`)
    await closeMonth(address, people, history)
    await waitForLogs(uploader, logIds, (done) => log(`Detection: ${done} of ${logIds.length} logs analysed`))
    await disputeOnePlay(address, people, current)
    await writeSignIns(people)
  } finally {
    await rm(directory, { recursive: true, force: true })
    storage.close()
    await database.destroy()
  }
}
