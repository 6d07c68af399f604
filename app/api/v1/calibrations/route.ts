import { z } from 'zod'
import { createCalibration, listCalibrations } from '@/lib/access/calibrations'
import { newCalibrationSchema } from '@/lib/domain/calibration'
import { pageOf } from '../_page'
import { calibrationListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Calibrations, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor, ...filter } = readQuery(request, calibrationListQuery)
    const { page, answer: listed } = pageOf(
      'calibrations',
      { limit, cursor },
      z.strictObject({ validFrom: z.string(), id: z.string() }),
    )
    return listed(await listCalibrations(actor, filter, page), (row) => ({ validFrom: row.validFrom, id: row.id }))
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createCalibration(actor, await readJson(request, newCalibrationSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/calibrations/${made.id}` })
  })
}
