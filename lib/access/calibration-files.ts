import 'server-only'
import path from 'node:path'
import { calibrationKinds, newCalibrationSchema, type Calibration, type NewCalibration } from '../domain/calibration'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { putFile, requireSpace, withIncomingFolder } from '../storage/file-store'
import { readResponseFactorsInThread } from '../uploads/read-job'
import { type ResponseConvention } from '../uploads/read-response-factors'
import { receiveFiles, type ReceivedFile } from '../uploads/receive-multipart'
import { authorise } from './authorise'
import { createCalibrations } from './calibrations'

const LARGEST_TABLE_BYTES = 1_000_000

export interface CalibrationFileOptions {
  /** said by a person where the file does not say it */
  readonly convention: ResponseConvention | null
  readonly validFrom: string
  readonly validTo: string | null
  readonly rigId: string | null
  readonly instrument: string
  /** relative standard uncertainty of the factors where the file states none */
  readonly relativeStandardUncertainty: number | null
}

/** Makes calibrations of the dropped tables of response factors, of all or of none; the files are kept as they came. */
export async function addCalibrationFiles(
  actor: Actor,
  request: Request,
  options: CalibrationFileOptions,
): Promise<Calibration[]> {
  authorise(can.makeCalibration(actor), 'Calibrations are made by technicians, researchers, leads and admins.')
  await requireSpace(LARGEST_TABLE_BYTES)
  return withIncomingFolder(async (folder) => {
    const inputs: NewCalibration[] = []
    const files = await receiveFiles(request, { folder, maximumBytes: LARGEST_TABLE_BYTES, maximumFiles: 5 })
    for (const file of files) inputs.push(await calibrationOf(file, options))
    // the bytes stand in the store, synced, before the records that name them; files that no record came to name are swept
    for (const file of files) await putFile(file.path, file.sha256)
    return createCalibrations(actor, inputs)
  })
}

async function calibrationOf(file: ReceivedFile, options: CalibrationFileOptions): Promise<NewCalibration> {
  const table = await readResponseFactorsInThread(file.path, file.name)
  const convention = table.convention ?? options.convention
  if (convention === null)
    throw new AppError(
      'unprocessable',
      `${file.name}: the header “${table.header}” does not say whether a number is an amount per area (factor) or an area per amount (sensitivity). The two are reciprocals: say which.`,
      { issues: [{ field: 'convention', message: 'Factor or sensitivity?' }] },
    )
  return newCalibrationSchema.parse({
    kind: calibrationKinds[0],
    name: path.parse(file.name).name,
    instrument: options.instrument,
    rigId: options.rigId,
    convention,
    entries: table.entries.map((entry) => ({
      ...entry,
      relativeStandardUncertainty:
        entry.absoluteStandardUncertainty === null
          ? (entry.relativeStandardUncertainty ?? options.relativeStandardUncertainty)
          : null,
    })),
    fileSha256: file.sha256,
    validFrom: options.validFrom,
    validTo: options.validTo,
  })
}
