import { describe, expect, it } from 'vitest'
import { mainProduct, notesOfHolds, workingOfPoint } from '@/components/run/points-table'
import { type Caution } from '@/lib/analysis/caution'
import { exampleRunResult } from '../../../support/example-run-result'

const points = exampleRunResult().reduction?.points ?? []
const note = (code: string, tag: string): Caution => ({
  code,
  severity: 'note',
  tag,
  sentence: tag,
  value: null,
  limit: null,
  unit: '',
  source: '',
  holdNumber: null,
})

describe('notes of the holds', () => {
  it('are written once with their holds, whatever number each of them has', () => {
    const noted = points.slice(0, 3).map((point, index) => ({
      ...point,
      cautions: [
        note('routes', `routes differ, z ${index + 2}.1`),
        note('unseen', 'CH4 not seen'),
        note('unseen', 'CO not seen'),
      ],
    }))
    expect(notesOfHolds(noted).map(({ tag, holds }) => [tag, holds])).toEqual([
      ['routes differ, z 2.1', [1, 2, 3]],
      ['CH4 not seen', [1, 2, 3]],
      ['CO not seen', [1, 2, 3]],
    ])
  })
  it('leave out what is a doubt: that stands in its row', () => {
    expect(notesOfHolds(points)).toEqual([])
  })
})

describe('points', () => {
  it('name the main product and find the working of a number', () => {
    expect(mainProduct(points)).toBe('CH4')
    expect(mainProduct([])).toBeNull()
    const [first] = points
    if (!first) throw new Error('the example has it')
    expect(workingOfPoint(first, 'rateMolPerKgS')?.title).toBe('Rate at hold 1')
    expect(workingOfPoint(first, 'carbonSelectivity.CH4')).toBeNull()
  })
})
