import { readFileSync } from 'node:fs'
import path from 'node:path'
import { addCalibrationFiles } from '../lib/access/calibration-files'
import { addFiles, confirmUpload, correctUpload } from '../lib/access/uploads'
import { type Actor } from '../lib/domain/role'

/** What the technician of the demo says to the questions that these files cannot answer themselves. */
const SAID: Readonly<Record<string, string>> = {
  'date-order': 'day-first',
  'pressure-kind': 'gauge',
  'flow-reference': '273.15/101325',
  barometer: '101325',
  basis: 'dry',
  'time-zone': 'UTC',
}

function requestWith(file: string): Request {
  const form = new FormData()
  form.append('file', new File([readFileSync(file)], path.basename(file), { type: 'application/octet-stream' }))
  return new Request('http://localhost/', { method: 'POST', body: form })
}

/** Adds one file to a run the way the screen does: hand in, answer what is asked, confirm. */
export async function addDemoFile(actor: Actor, runId: string, file: string): Promise<void> {
  const [added] = await addFiles(actor, runId, requestWith(file))
  if (added === undefined || added.upload.detection === null)
    throw new Error(`${path.basename(file)}: ${added?.upload.failure ?? 'not read'}`)
  let { upload } = added
  const questions = upload.detection?.questions ?? []
  if (questions.length > 0) {
    const answers: Record<string, string> = {}
    for (const question of questions) answers[question.key] = question.proposal ?? SAID[question.key] ?? ''
    upload = await correctUpload(actor, upload.id, { answers }, upload.version)
  }
  await confirmUpload(actor, upload.id, upload.version)
}

/** Drops the table of response factors, valid from the day it was made. */
export async function addDemoCalibration(actor: Actor, file: string, validFrom: string): Promise<void> {
  await addCalibrationFiles(actor, requestWith(file), {
    convention: null,
    validFrom,
    validTo: null,
    rigId: null,
    instrument: 'gas chromatograph',
    relativeStandardUncertainty: 0.01,
  })
}
