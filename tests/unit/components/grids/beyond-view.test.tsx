import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { BeyondView, farColumns } from '@/components/grids/beyond-view'

const columns = ['TOF', 'Ea', 'ln A', 'Cautions', 'Decay'].map((name, place) => ({
  colId: name,
  name,
  left: place * 100,
  width: 100,
}))
const ids = (found: readonly { readonly colId: string }[]) => found.map((column) => column.colId)

describe('columns beyond the edges of the table', () => {
  it('are named on the side where they are', () => {
    const far = farColumns(columns, { left: 100, right: 350 })
    expect(ids(far.left)).toEqual(['TOF'])
    // Cautions goes from 300 to 400 and is cut at 350
    expect(ids(far.right)).toEqual(['Cautions', 'Decay'])
  })
  it('are none where all is in sight, a hair of a cell not counted', () => {
    expect(farColumns(columns, { left: 3, right: 497 })).toEqual({ left: [], right: [] })
    expect(renderToStaticMarkup(<BeyondView far={{ left: [], right: [] }} onShow={() => undefined} />)).toBe('')
  })
  it('are said in words that lead there', () => {
    const html = renderToStaticMarkup(
      <BeyondView far={farColumns(columns, { left: 100, right: 300 })} onShow={() => undefined} />,
    )
    expect(html.replace(/<[^>]+>/g, '|')).toContain('1 to the left: TOF')
    expect(html.replace(/<[^>]+>/g, '|')).toContain('2 to the right: Cautions, Decay')
    expect(html.match(/<button/g)).toHaveLength(2)
  })
})
