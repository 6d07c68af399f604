import { expect, test } from 'vitest'
import { issuesOf } from '@/lib/domain/action-answer'
import { newRigSchema } from '@/lib/domain/rig'
import { newLoadingSchema } from '@/lib/domain/run'
import { newSampleSchema, newSiteCountSchema } from '@/lib/domain/sample'

test.each([
  [newSampleSchema, { code: 'A', name: 'B', metalMassFraction: 5 }, 'metalMassFraction', 'This must be below 100 %.'],
  [newSampleSchema, { code: 'A', name: 'B', tortuosity: 0.01 }, 'tortuosity', 'This must be at least 0.1.'],
  [newSampleSchema, { code: 'A' }, 'name', 'This is missing.'],
  [newSampleSchema, { code: '', name: 'B' }, 'code', 'This is missing.'],
  [newSampleSchema, { code: 'A'.repeat(41), name: 'B' }, 'code', 'This may have at most 40 characters.'],
  [
    newSiteCountSchema,
    { method: 'total metal', molPerKg: 0.1, relativeStandardUncertainty: 8 },
    'relativeStandardUncertainty',
    'This must be at most 100 %.',
  ],
  [newLoadingSchema, { sampleId: 's', catalystMassKg: -1 }, 'catalystMassKg', 'This must be at least 0 kg.'],
  [newLoadingSchema, { sampleId: 's', catalystMassKg: 1e-4, bedLengthM: 0 }, 'bedLengthM', 'This must be above 0 m.'],
  [newLoadingSchema, { sampleId: 's', catalystMassKg: 'much' }, 'catalystMassKg', 'This must be a number.'],
  [
    newRigSchema,
    { code: 'A', name: 'B', channels: [{ code: '1' }], barometerPa: 9_900 },
    'barometerPa',
    'This must be at least 0.5 bar.',
  ],
] as const)('%#: a refused value is told in a field’s own unit', (schema, value, field, message) => {
  const result = schema.safeParse(value)
  expect(result.success ? [] : issuesOf(result.error)).toContainEqual({ field, message })
})
