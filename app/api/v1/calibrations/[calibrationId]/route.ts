import { changeCalibration, getCalibration } from '@/lib/access/calibrations'
import { calibrationChangeSchema } from '@/lib/domain/calibration'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ calibrationId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { calibrationId } = await pathIds(context)
    const found = await getCalibration(actor, calibrationId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { calibrationId } = await pathIds(context)
    const version = versionFromIfMatch(request, calibrationId)
    const changed = await changeCalibration(
      actor,
      calibrationId,
      await readJson(request, calibrationChangeSchema),
      version,
    )
    return answer(changed, { record: changed })
  })
}
