import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Dimension } from '@/lib/analysis/units/dimension'
import { molarFlowFromVolumeFlow, volumeFlowFromMolarFlow } from '@/lib/analysis/units/molar-flow-from-volume-flow'
import { parseNumber } from '@/lib/analysis/units/parse-number'
import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { UNIT_WORDS } from '@/lib/analysis/units/unit-table'
import { unitFromAlias } from '@/lib/analysis/units/unit-from-alias'

const SAMPLES: readonly (readonly [string, Dimension])[] = [
  ['°C', 'temperature'],
  ['°F', 'temperature'],
  ['psi', 'pressure'],
  ['Torr', 'pressure'],
  ['bar(g)', 'pressure'],
  ['mg', 'mass'],
  ['lb', 'mass'],
  ['µm', 'length'],
  ['mL/min', 'volume-flow'],
  ['Nm3/h', 'volume-flow'],
  ['scfh', 'volume-flow'],
  ['mmol/min', 'molar-flow'],
  ['h', 'time'],
  ['ppm', 'fraction'],
  ['µmol/g', 'amount-per-mass'],
  ['eV', 'energy-per-amount'],
  ['kcal/mol', 'energy-per-amount'],
  ['mmol g-1 h-1', 'rate-per-mass'],
  ['h-1', 'frequency'],
  ['m2/g', 'area-per-mass'],
  ['g/cm3', 'density'],
]

const plainNumber = fc.double({ min: 1e-6, max: 1e6, noNaN: true })

describe('units come back as they went', () => {
  it.each(SAMPLES)('%s', (alias, dimension) => {
    const unit = unitFromAlias(alias, dimension)
    expect(unit).not.toBeNull()
    fc.assert(
      fc.property(plainNumber, (x) => {
        const back = unit?.fromSi(unit.toSi(x)) ?? NaN
        // a shifted scale loses digits of small values against its 273.15 or 459.67
        expect(Math.abs(back - x)).toBeLessThanOrEqual(
          4e-15 * Math.max(x, dimension === 'temperature' ? 500 : 0) + 1e-300,
        )
      }),
    )
  })

  it('every word of the table is found again under every spelling, and no spelling has two meanings', () => {
    const seen = new Map<string, string>()
    for (const word of UNIT_WORDS)
      for (const alias of word.aliases) {
        expect(seen.get(alias), `${alias} is in the table twice`).toBeUndefined()
        seen.set(alias, word.label)
      }
  })

  it('own labels are read back as the same unit', () => {
    for (const [alias, dimension] of SAMPLES) {
      const unit = unitFromAlias(alias, dimension)
      const again = unitFromAlias(unit?.label ?? '', dimension)
      expect(again?.toSi(1.7), `${alias} → ${unit?.label ?? ''}`).toBe(unit?.toSi(1.7))
    }
  })
})

describe('numbers come back from every writing', () => {
  it('with comma or point, grouped or not', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 999_999_999 }),
        fc.integer({ min: 0, max: 999_999 }),
        fc.constantFrom(' ', "'", '\u202f', '\u00a0', '.'),
        (whole, part, mark) => {
          const digits = String(whole)
          const grouped = digits.replace(/\B(?=(\d{3})+$)/g, mark)
          const fraction = String(part).padStart(6, '0')
          const value = Number(`${digits}.${fraction}`)
          expect(parseNumber(`${grouped},${fraction}`)).toEqual({ ok: true, value })
          expect(parseNumber(`−${digits}.${fraction}`)).toEqual({ ok: true, value: -value })
        },
      ),
    )
  })
  it.each(['valueOf', 'constructor', 'toString', '__proto__', 'hasOwnProperty'])('takes "%s" for no unit', (word) => {
    expect(parseQuantity(`1 ${word}`, 'mass').ok).toBe(false)
    expect(parseQuantity(`0${word}`, 'volume-flow').ok).toBe(false)
  })
  it('never gives a number that is not finite, nor throws, whatever is typed', () => {
    fc.assert(
      fc.property(
        fc.string({ maxLength: 30 }),
        fc.constantFrom(...SAMPLES.map(([, dimension]) => dimension)),
        (text, dimension) => {
          const reading = parseQuantity(text, dimension)
          if (reading.ok) expect(Number.isFinite(reading.valueSi)).toBe(true)
          else expect(reading.sentence.length).toBeGreaterThan(10)
        },
      ),
      { numRuns: 2_000 },
    )
  })
})

describe('flows', () => {
  it('keep their amount through any reference state', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-9, max: 1, noNaN: true }),
        fc.double({ min: 200, max: 400, noNaN: true }),
        fc.double({ min: 5e4, max: 2e5, noNaN: true }),
        (flow, temperatureK, pressurePa) => {
          const reference = { temperatureK, pressurePa }
          expect(molarFlowFromVolumeFlow(volumeFlowFromMolarFlow(flow, reference), reference) / flow).toBeCloseTo(1, 13)
        },
      ),
    )
  })
})
