import { describe, expect, it } from 'vitest'
import { paramsWithRankingView, rankingViewFromParams } from '@/components/campaign/ranking-view-params'
import { rankingQueryString } from '@/components/server-state/ranking'

const read = (query: string) => rankingViewFromParams(new URLSearchParams(query))

describe('view of a ranking in the address', () => {
  it('is the method’s own with undecided runs when nothing is said', () => {
    expect(read('')).toEqual({ referenceTemperatureK: null, includeProvisional: true })
  })
  it('goes there and back', () => {
    const view = { referenceTemperatureK: 533.15, includeProvisional: false }
    const query = paramsWithRankingView(new URLSearchParams('tab=1'), view).toString()
    expect(query).toBe('tab=1&at=260&provisional=0')
    expect(read(query)).toEqual(view)
  })
  it.each(['at=warm', 'at=', 'at=1e9', 'at=-400'])('ignores %s', (query) => {
    expect(read(query).referenceTemperatureK).toBeNull()
  })
  it('asks the server in kelvin', () => {
    expect(rankingQueryString({ referenceTemperatureK: 533.15, includeProvisional: true })).toBe(
      'referenceTemperatureK=533.15&provisional=1',
    )
  })
})
