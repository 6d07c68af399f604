'use server'

import { revalidatePath } from 'next/cache'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { createCalibration } from '@/lib/access/calibrations'
import { answerAction } from '@/lib/domain/action-answer'
import { calibrationKinds, newCalibrationSchema } from '@/lib/domain/calibration'
import { FormReader } from '@/lib/domain/form-reader'

/** A calibration with one number: a flow controller, a balance, a thermocouple, a gauge. Response factors come as a table. */
export async function createCalibrationAction(_previous: FormState, data: FormData): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const kind = form.choice('kind', calibrationKinds, 'Choose what was calibrated.')
    const name = form.required('name', 'Name the certificate or the record.')
    const isTemperature = kind === 'thermocouple'
    const uncertainty = form.number('uncertainty', 'Give the standard uncertainty as a number.')
    const from = form.required('validFrom', 'Say from when it holds.')
    const to = form.text('validTo')
    form.finish()
    const calibration = await createCalibration(
      actor,
      newCalibrationSchema.parse({
        kind,
        name,
        instrument: form.text('instrument'),
        rigId: form.orNull('rigId'),
        standardUsed: form.text('standardUsed'),
        entries: [
          {
            value: 0,
            unit: isTemperature ? 'K' : '%',
            relativeStandardUncertainty: isTemperature ? null : uncertainty / 100,
            absoluteStandardUncertainty: isTemperature ? uncertainty : null,
          },
        ],
        validFrom: `${from}T00:00:00Z`,
        validTo: to === '' ? null : `${to}T00:00:00Z`,
      }),
    )
    revalidatePath('/calibrations')
    return `${calibration.name} is kept. Runs that start while it holds use it from now on.`
  })
}
