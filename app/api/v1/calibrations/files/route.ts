import { addCalibrationFiles } from '@/lib/access/calibration-files'
import { calibrationFilesQuery } from '../../_requests'
import { answer, handle, readQuery } from '../../_respond'

/** Makes calibrations of dropped tables of response factors. */
export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const query = readQuery(request, calibrationFilesQuery)
    const items = await addCalibrationFiles(actor, request, {
      convention: query.convention ?? null,
      validFrom: query.validFrom,
      validTo: query.validTo ?? null,
      rigId: query.rigId ?? null,
      instrument: query.instrument,
      relativeStandardUncertainty: query.relativeStandardUncertainty ?? null,
    })
    return answer({ items }, { status: 201 })
  })
}
