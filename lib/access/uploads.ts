import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor, type Transaction } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { prepareReadings } from '../../db/mutations/prepare-readings'
import { publishReadingSet, stageReadingSet, supersedeReadingSets } from '../../db/mutations/readings'
import { insertColumnMap } from '../../db/mutations/rigs'
import { insertUpload, updateUpload, type UploadChange } from '../../db/mutations/uploads'
import { selectCampaign } from '../../db/queries/campaigns'
import { selectReaction } from '../../db/queries/reactions'
import {
  selectColumnMap,
  selectColumnMapByFingerprint,
  selectRig,
  selectValidCalibrations,
} from '../../db/queries/rigs'
import { selectRun } from '../../db/queries/runs'
import {
  selectReadingSpans,
  selectRunsWithBytes,
  selectUnreadUploads,
  selectUpload,
  selectUploadIdByHash,
  selectUploads,
} from '../../db/queries/uploads'
import { canonicalJson } from '../domain/canonical-json'
import { columnMapSpecificationSchema, type ColumnMapSpecification } from '../domain/column-map'
import { AppError } from '../domain/errors'
import {
  PARSER_VERSION,
  type Detection,
  type FileReading,
  type Problem,
  type Question,
  type Upload,
} from '../domain/intake'
import { type Actor } from '../domain/role'
import { type Run } from '../domain/run'
import { type UploadPreview } from '../domain/upload-preview'
import { environment } from '../environment'
import { can } from '../policy/can'
import { readableCampaigns } from '../policy/campaign-scope'
import { hasFile, openFile, pathOf, putFile, requireSpace, withIncomingFolder } from '../storage/file-store'
import { answerQuestions, type Answers } from '../uploads/column-map/answer-question'
import { findQuestions } from '../uploads/column-map/questions'
import { problem } from '../uploads/problem-list'
import { detectInThread, readInThread } from '../uploads/read-job'
import { type ReadingContext } from '../uploads/reading-context'
import { LIMITS } from '../uploads/limits'
import { packChromatograms, type PackedFile } from '../uploads/pack-chromatograms'
import { receiveFiles, type ReceivedFile } from '../uploads/receive-multipart'
import { authorise, hideUnless } from './authorise'
import { holdOpenCampaign, touchableCampaigns } from './campaign-rights'
import { previewSeries } from './preview-series'

const MOST_FILES = 20
const ADDERS = 'Files are added by the people who work in the campaign while the run is open.'
const CHANGERS =
  'A file that was confirmed or set aside is changed by the people who work in the campaign while the run is open; a token needs the scope write for it.'

async function touchedRun(actor: Actor, runId: string): Promise<Run> {
  const run = await selectRun(await getDatabase(), touchableCampaigns(actor), runId)
  hideUnless(run !== null)
  return run
}

/** The file and its run, for somebody who may add files to it. */
async function openUpload(actor: Actor, id: string): Promise<{ upload: Upload; run: Run }> {
  const upload = await selectUpload(await getDatabase(), touchableCampaigns(actor), id)
  hideUnless(upload !== null)
  const run = await touchedRun(actor, upload.runId)
  authorise(can.addFiles(actor, run), ADDERS)
  return { upload, run }
}

/** The same for somebody who may take the file where it goes from here. */
async function openUploadToChange(actor: Actor, id: string): Promise<{ upload: Upload; run: Run }> {
  const opened = await openUpload(actor, id)
  if (rightFor(opened.upload) === 'changeFiles') authorise(can.changeFiles(actor, opened.run), CHANGERS)
  return opened
}

/**
 * Holds the campaign and asks for the right once more, of the run as it is now: a transfer or a reading takes its time, and the run may have been handed in
 * or decided on meanwhile.
 */
async function holdRunToChange(
  tx: Transaction,
  actor: Actor,
  { id, campaignId }: Run,
  right: 'addFiles' | 'changeFiles',
): Promise<void> {
  await holdOpenCampaign(tx, campaignId)
  const run = await selectRun(tx, [campaignId], id)
  hideUnless(run !== null)
  authorise(can[right](actor, run), right === 'addFiles' ? ADDERS : CHANGERS)
}

/** What counts in the run already, or was put aside, takes more than a file that is new. */
const rightFor = ({ state }: Upload) => (state === 'confirmed' || state === 'set-aside' ? 'changeFiles' : 'addFiles')

/** What is known outside the file: the rig's clock, barometer and flow reference, and the species that may stand in it. */
async function contextOf(run: Run): Promise<ReadingContext> {
  const db = await getDatabase()
  const rig = await selectRig(db, run.rigId)
  const campaign = await selectCampaign(db, [run.campaignId], run.campaignId)
  const reaction = campaign === null ? null : await selectReaction(db, campaign.reactionId)
  const calibrations = await selectValidCalibrations(db, new Date(run.startedAt), run.rigId)
  const species = new Set([
    ...(reaction?.steps ?? []).flatMap((step) => Object.keys(step)),
    ...run.feed.map((entry) => entry.species),
    ...calibrations.flatMap((calibration) => calibration.entries.flatMap((entry) => entry.species ?? [])),
  ])
  return {
    rigTimeZone: rig?.timeZone ?? '',
    barometerPa: run.barometerPa ?? rig?.barometerPa ?? null,
    species: [...species].sort(),
    flowReference:
      rig?.flowReferenceTemperatureK != null && rig.flowReferencePressurePa != null
        ? { temperatureK: rig.flowReferenceTemperatureK, pressurePa: rig.flowReferencePressurePa }
        : null,
  }
}

/** Files of a run, in the order they were added. */
export async function listUploads(actor: Actor, runId: string): Promise<Upload[]> {
  const db = await getDatabase()
  hideUnless((await selectRun(db, readableCampaigns(actor), runId)) !== null)
  return selectUploads(db, readableCampaigns(actor), runId)
}

export async function getUpload(actor: Actor, id: string): Promise<Upload> {
  const upload = await selectUpload(await getDatabase(), readableCampaigns(actor), id)
  hideUnless(upload !== null)
  return upload
}

/** A restored database beside a store that was not restored has records without their bytes: said, not stumbled over. */
async function requireBytes(upload: Upload): Promise<void> {
  if (!(await hasFile(upload.sha256)))
    throw new AppError(
      'not-found',
      `The bytes of “${upload.fileName}” are not in the file store, though its record is there. Tell an admin: a backup of the folder “files” has them.`,
    )
}

/** The bytes as they were handed in. */
export async function openUploadContent(actor: Actor, id: string) {
  const upload = await getUpload(actor, id)
  await requireBytes(upload)
  return { upload, ...(await openFile(upload.sha256)) }
}

export interface AddedFile {
  readonly upload: Upload
  /** false when the run had these very bytes already */
  readonly isNew: boolean
}

/**
 * Takes the files of a request into the store and onto the run, then looks at each. Who may not add files is refused before a byte is read;
 * a transfer that breaks off leaves nothing behind; bytes that the run has already are answered with the file that has them.
 */
export async function addFiles(actor: Actor, runId: string, request: Request): Promise<AddedFile[]> {
  const run = await touchedRun(actor, runId)
  authorise(can.addFiles(actor, run), ADDERS)
  const declared = Number(request.headers.get('content-length') ?? 0)
  await requireSpace(Number.isFinite(declared) ? declared : 0)
  return withIncomingFolder(async (folder) => {
    const received = await receiveFiles(request, {
      folder,
      maximumBytes: environment.MAX_UPLOAD_BYTES,
      maximumFiles: LIMITS.chromatogram.setCount,
    })
    const files = packChromatograms(received, folder)
    if (files.length > MOST_FILES)
      throw new AppError(
        'too-large',
        `At most ${String(MOST_FILES)} files at a time, chromatograms counted as one. Send them in several requests; nothing of these was kept.`,
      )
    const added: AddedFile[] = []
    for (const file of files) added.push(await addFile(actor, run, file))
    return added
  })
}

async function addFile(actor: Actor, run: Run, file: ReceivedFile | PackedFile): Promise<AddedFile> {
  const db = await getDatabase()
  const id = randomUUID()
  // the bytes stand in the store, synced, before the record that names them
  await putFile(file.path, file.sha256)
  const isNew = await db.transaction(async (tx) => {
    await holdRunToChange(tx, actor, run, 'addFiles')
    const inserted = await insertUpload(tx, {
      id,
      campaignId: run.campaignId,
      runId: run.id,
      sha256: file.sha256,
      byteCount: file.byteCount,
      fileName: file.name,
      createdBy: actor.userId,
    })
    if (inserted)
      await insertAuditEntry(tx, {
        actor,
        action: 'upload.add',
        entity: 'upload',
        entityId: id,
        campaignId: run.campaignId,
        after: {
          runId: run.id,
          fileName: file.name,
          sha256: file.sha256,
          byteCount: file.byteCount,
          ...('parts' in file ? { parts: file.parts } : {}),
        },
      })
    return inserted
  })
  if (!isNew) {
    const known = await selectUploadIdByHash(db, run.id, file.sha256)
    hideUnless(known !== null)
    const upload = await readBack(run, known)
    // the process ended between storing and reading it: handing it in once more is how a person goes on
    return { upload: upload.state === 'received' ? await detect(run, known) : upload, isNew }
  }
  return { upload: await detect(run, id), isNew }
}

async function readBack(run: Run, id: string): Promise<Upload> {
  const upload = await selectUpload(await getDatabase(), [run.campaignId], id)
  hideUnless(upload !== null)
  return upload
}

/** Notes what a file turned out to be; of a closed campaign too. */
async function change(run: Run, id: string, version: number, to: UploadChange): Promise<Upload> {
  const db = await getDatabase()
  await db.transaction((tx) => changeIn(tx, id, version, to))
  return readBack(run, id)
}

async function changeIn(tx: Transaction, id: string, version: number, to: UploadChange): Promise<void> {
  if (!(await updateUpload(tx, { id, version }, to)))
    throw new AppError('stale', 'Somebody else worked on this file meanwhile. Look at it again.')
}

const isFatal = (problems: readonly Problem[]) => problems.some((entry) => entry.severity === 'fatal')

/** Looks at a file and proposes what its columns mean; a map that the rig has for these columns answers in advance. */
async function detect(run: Run, id: string): Promise<Upload> {
  const upload = await readBack(run, id)
  const context = await contextOf(run)
  const found = await detectInThread(pathOf(upload.sha256), upload.fileName, context)
  const first = found.detections[0]
  if (first === undefined) {
    const sentence = found.problems[0]?.sentence ?? 'Nothing in the file could be read as a table.'
    return change(run, id, upload.version, {
      state: 'failed',
      problems: found.problems,
      failure: `${sentence} The file is kept; it can stand beside the run as an attachment.`,
    })
  }
  const db = await getDatabase()
  const map = await selectColumnMapByFingerprint(db, run.rigId, first.fingerprint)
  const detection: Detection = map === null ? first : recognised(first, map.id, map.specification)
  const questions = findQuestions(detection.proposal, detection.facts, context)
  return change(run, id, upload.version, {
    state: questions.length > 0 ? 'needs-answers' : 'ready',
    kind: detection.proposal.kind,
    format: detection.format,
    detection: { ...detection, questions },
    problems: [...(await sameBytes(run, upload)), ...found.problems],
    columnMapId: map?.id ?? null,
  })
}

/**
 * Looks at the files whose process ended between storing and reading them, one after the other, so that none stays in between for ever. What cannot be
 * looked at is marked as failed with the reason.
 *
 * @returns how many were looked at
 */
export async function resumeReadings(addedBefore: Date): Promise<number> {
  const db = await getDatabase()
  const unread = await selectUnreadUploads(db, addedBefore)
  for (const { id, runId, campaignId } of unread) {
    const run = await selectRun(db, [campaignId], runId)
    if (run === null) throw new Error(`file ${id} is of a run that is not there`)
    const upload = await readBack(run, id)
    if (await hasFile(upload.sha256)) await detect(run, id)
    else
      await change(run, id, upload.version, {
        state: 'failed',
        failure: 'The server stopped while the file was taken in, and its bytes are not in the store. Add it again.',
      })
  }
  return unread.length
}

/** The same bytes with another run of the campaign: one measurement must not count as two. */
async function sameBytes(run: Run, upload: Upload): Promise<Problem[]> {
  const twins = await selectRunsWithBytes(await getDatabase(), [run.campaignId], upload.sha256, run.id)
  return twins.map(({ runCode, fileName }) =>
    problem({
      code: 'same-bytes',
      severity: 'problem',
      found: `“${fileName}” of ${runCode}`,
      expected: 'bytes that no other run has',
      sentence: `${runCode} has these very bytes too, as “${fileName}”. One measurement must not count for two runs: is this file of this run?`,
    }),
  )
}

/** The kept map with what belongs to this one file: its sheet and the start it states. */
function recognised(detection: Detection, columnMapId: string, kept: ColumnMapSpecification): Detection {
  return {
    ...detection,
    columnMapId,
    proposal: { ...kept, sheet: detection.proposal.sheet, elapsedStart: detection.proposal.elapsedStart },
    facts: {
      ...detection.facts,
      isKindOpen: false,
      isDecimalMarkOpen: false,
      isDateOrderOpen: detection.facts.isDateOrderOpen && kept.dateOrder === null,
    },
  }
}

/** Takes answers and corrections; what is still open stays a question. */
export async function correctUpload(
  actor: Actor,
  id: string,
  input: { readonly specification?: ColumnMapSpecification; readonly answers?: Answers },
  version: number,
): Promise<Upload> {
  const { upload, run } = await openUploadToChange(actor, id)
  const correct = async (to: UploadChange): Promise<Upload> => {
    const db = await getDatabase()
    await db.transaction(async (tx) => {
      await holdRunToChange(tx, actor, run, rightFor(upload))
      await changeIn(tx, id, version, to)
    })
    return readBack(run, id)
  }
  if (upload.detection === null) {
    // nothing to correct in it, but it can be kept beside the run as what it is
    if (input.answers?.kind === 'attachment') return correct({ state: 'ready', kind: 'attachment' })
    throw new AppError('unprocessable', 'The file could not be read as a table, so there are no columns to correct.')
  }
  const context = await contextOf(run)
  const answered = answerQuestions(
    input.specification ?? upload.detection.proposal,
    upload.detection.facts,
    input.answers ?? {},
  )
  const questions = findQuestions(answered.specification, answered.facts, context)
  return correct({
    state: upload.state === 'confirmed' ? 'confirmed' : questions.length > 0 ? 'needs-answers' : 'ready',
    kind: answered.specification.kind,
    detection: { ...upload.detection, proposal: answered.specification, facts: answered.facts, questions },
  })
}

async function readingOf(run: Run, upload: Upload) {
  if (upload.detection === null)
    throw new AppError('unprocessable', upload.failure ?? 'The file could not be read as a table.')
  const specification = upload.detection.proposal
  await requireBytes(upload)
  const context = await contextOf(run)
  const reading = await readInThread(pathOf(upload.sha256), upload.fileName, specification, context)
  const open = findQuestions(specification, upload.detection.facts, context)
  const asked = new Map<string, Question>([...open, ...reading.questions].map((question) => [question.key, question]))
  return { reading, questions: [...asked.values()] }
}

/** Everything that would be taken in, without taking it in: problems by row and column, and a thinned series of each channel. */
export async function previewUpload(actor: Actor, id: string): Promise<UploadPreview> {
  const { upload, run } = await openUpload(actor, id)
  const { reading, questions } = await readingOf(run, upload)
  return {
    rowCount: reading.rowCount,
    problems: reading.problems,
    questions,
    channels: previewSeries(reading.channels),
  }
}

/** A restarted log goes on where the first one ended. Two files over the same hours are two measurements, and their mean is neither. */
const OVERLAP_ALLOWED_S = 60

async function refuseOverlap(db: Executor, run: Run, uploadId: string, reading: FileReading): Promise<void> {
  const time = reading.channels.find(({ name }) => name === 'time')?.values ?? new Float64Array()
  const [firstS, lastS] = [time[0] ?? Number.NaN, time.at(-1) ?? Number.NaN]
  for (const other of await selectReadingSpans(db, run.id, reading.kind, uploadId)) {
    if (other.firstAt === null || other.lastAt === null) continue
    const [fromS, toS] = [other.firstAt.getTime() / 1_000, other.lastAt.getTime() / 1_000]
    const commonS = Math.min(lastS, toS) - Math.max(firstS, fromS)
    // one injection a file: the same instant twice is the same injection twice
    const isSameInstant = commonS === 0 && firstS === lastS && fromS === toS
    if (!isSameInstant && !(commonS > OVERLAP_ALLOWED_S)) continue
    const what = reading.kind === 'rig-log' ? 'log' : 'injections'
    throw new AppError(
      'conflict',
      `${run.code} has ${what} over the same time from “${other.fileName}” (${instantText(fromS)} to ${instantText(toS)}; this file goes from ${instantText(firstS)} to ${instantText(lastS)}). Set one of the two aside, or add this file to the run it belongs to. If the times are wrong, correct how they are read.`,
    )
  }
}

const instantText = (seconds: number): string =>
  `${new Date(seconds * 1_000).toISOString().slice(0, 16).replace('T', ' ')} UTC`

const mapText = (specification: ColumnMapSpecification) =>
  canonicalJson(columnMapSpecificationSchema.parse({ ...specification, elapsedStart: null, sheet: '' }))

/**
 * Takes the file's readings into the run as its map says. All rows or none: values are staged first, then published together with the map, the
 * file's state and the audit entry in one transaction. A second confirmation reads the file anew; the earlier reading stays in history.
 * A map not met before is kept for the rig's next files where the actor may make column maps; an instrument's token, or one bound to a campaign, has its
 * file read as answered and leaves the rig's maps, which other campaigns share, alone.
 */
export async function confirmUpload(actor: Actor, id: string, version: number, now = new Date()): Promise<Upload> {
  const { upload, run } = await openUploadToChange(actor, id)
  if (upload.version !== version)
    throw new AppError('stale', 'Somebody else worked on this file meanwhile. Look at it again.')
  const detection = upload.detection
  const isAttachment = (detection?.proposal.kind ?? upload.kind) === 'attachment'
  const read = isAttachment ? null : await readingOf(run, upload)
  const questions =
    read?.questions ??
    (detection === null ? [] : findQuestions(detection.proposal, detection.facts, await contextOf(run)))
  if (questions.length > 0)
    throw new AppError('unprocessable', `Something is still open: ${questions[0]?.sentence ?? ''}`, {
      issues: questions.map((question) => ({ field: question.key, message: question.sentence })),
    })
  const reading = read?.reading ?? null
  if (reading !== null && (isFatal(reading.problems) || reading.rowCount === 0))
    throw new AppError(
      'unprocessable',
      reading.problems.find((entry) => entry.severity === 'fatal')?.sentence ??
        'The file holds no row that could be read.',
      {
        issues: reading.problems
          .slice(0, 50)
          .map((entry) => ({ field: `row ${entry.line ?? '?'}`, message: entry.sentence })),
      },
    )
  const db = await getDatabase()
  if (reading !== null) await refuseOverlap(db, run, id, reading)
  const staged =
    reading === null
      ? null
      : await stageReadingSet(
          db,
          { uploadId: id, runId: run.id, kind: reading.kind, columnMapId: null, parserVersion: PARSER_VERSION },
          await prepareReadings(reading.channels),
        )
  await db.transaction(async (tx) => {
    await holdRunToChange(tx, actor, run, rightFor(upload))
    let columnMapId = upload.columnMapId
    const known = columnMapId === null ? null : await selectColumnMap(tx, columnMapId)
    if (
      reading !== null &&
      detection !== null &&
      (known === null || mapText(known.specification) !== mapText(detection.proposal))
    ) {
      columnMapId = can.makeColumnMap(actor) ? randomUUID() : null
      if (columnMapId !== null)
        await insertColumnMap(tx, {
          id: columnMapId,
          rigId: run.rigId,
          instrument: detection.proposal.kind === 'rig-log' ? 'Rig log' : 'Analyser',
          fingerprint: detection.fingerprint,
          specification: { ...detection.proposal, elapsedStart: null },
          sampleFileSha256: upload.sha256,
          createdBy: actor.userId,
        })
    }
    if (staged === null) await supersedeReadingSets(tx, id, now)
    else await publishReadingSet(tx, staged.id, now)
    const isChanged = await updateUpload(
      tx,
      { id, version },
      {
        state: 'confirmed',
        kind: detection?.proposal.kind ?? 'attachment',
        problems: reading?.problems ?? upload.problems,
        columnMapId,
        confirmedBy: actor.userId,
        confirmedAt: now,
      },
    )
    if (!isChanged) throw new AppError('stale', 'Somebody else worked on this file meanwhile. Look at it again.')
    await insertAuditEntry(tx, {
      actor,
      action: 'upload.confirm',
      entity: 'upload',
      entityId: id,
      campaignId: run.campaignId,
      after: {
        runId: run.id,
        kind: detection?.proposal.kind ?? 'attachment',
        columnMapId,
        rows: reading?.rowCount ?? 0,
      },
    })
  })
  return readBack(run, id)
}

/** Puts a file aside: it stays in the store and in the list, and its readings no longer count. */
export async function setUploadAside(
  actor: Actor,
  id: string,
  version: number,
  reason: string,
  now = new Date(),
): Promise<Upload> {
  const { upload, run } = await openUpload(actor, id)
  authorise(can.changeFiles(actor, run), CHANGERS)
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    await holdRunToChange(tx, actor, run, 'changeFiles')
    if (!(await updateUpload(tx, { id, version }, { state: 'set-aside' })))
      throw new AppError('stale', 'Somebody else worked on this file meanwhile. Look at it again.')
    await supersedeReadingSets(tx, id, now)
    await insertAuditEntry(tx, {
      actor,
      action: 'upload.set-aside',
      entity: 'upload',
      entityId: id,
      campaignId: run.campaignId,
      before: { state: upload.state },
      after: { state: 'set-aside' },
      reason,
    })
  })
  return readBack(run, id)
}
