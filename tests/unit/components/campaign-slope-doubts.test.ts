import { expect, test } from 'vitest'
import { slopeDoubts } from '@/components/campaign/slope-pairs'
import { raiseCaution } from '@/lib/analysis/cautions'
import { exampleRanking } from '@/tests/support/example-ranking'

test('a pair says which of its slopes is not that of the reaction alone', () => {
  const [first, second] = exampleRanking().rows
  if (first === undefined || second === undefined) throw new Error('an example has two rows')
  const rows = [
    {
      ...first,
      sampleCode: 'A',
      cautions: [
        raiseCaution('deactivation', {
          value: 0.8655,
          limit: 0.03,
          more: { temperatureK: 518, lossPerH: 0.034, corrected: '' },
        }),
      ],
    },
    { ...second, sampleCode: 'B', cautions: [raiseCaution('few-temperatures', { value: 4, limit: 5 })] },
  ]
  expect(slopeDoubts(rows, ['A', 'B'])).toEqual(['A: lost 13 % on stream'])
  expect(slopeDoubts(rows, ['B'])).toEqual([])
})
