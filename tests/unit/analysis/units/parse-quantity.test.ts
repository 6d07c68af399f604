import { describe, expect, it } from 'vitest'
import { parseNumber } from '@/lib/analysis/units/parse-number'
import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { parseRange } from '@/lib/analysis/units/parse-range'
import { type Dimension } from '@/lib/analysis/units/dimension'
import { unitFromAlias } from '@/lib/analysis/units/unit-from-alias'

const si = (text: string, dimension: Dimension, options = {}) => {
  const reading = parseQuantity(text, dimension, options)
  if (!reading.ok) throw new Error(`${text}: ${reading.sentence}`)
  return reading.valueSi
}

describe('numbers as written', () => {
  it.each([
    ['7,2', 7.2],
    ['7.2', 7.2],
    ['1.234,5', 1234.5],
    ['1,234.5', 1234.5],
    ['1 234,5', 1234.5],
    ['1\u202f234,5', 1234.5],
    ['1\u00a0234', 1234],
    ["1'234.5", 1234.5],
    ['1,234,567', 1234567],
    ['1.234.567', 1234567],
    ['0,125', 0.125],
    ['1.234', 1.234],
    ['−5', -5],
    ['+5', 5],
    ['1.0E-03', 0.001],
    ['1,0E-03', 0.001],
    ['1.0D-03', 0.001],
    ['1,2 × 10⁻⁵', 1.2e-5],
    ['1.2x10^-5', 1.2e-5],
    ['.5', 0.5],
    ['5,', 5],
  ])('reads %s', (text, value) => {
    expect(parseNumber(text)).toEqual({ ok: true, value })
  })

  it('asks about a comma that can be two things, unless told', () => {
    const reading = parseNumber('1,234')
    expect(reading.ok).toBe(false)
    expect(reading.ok ? '' : reading.sentence).toContain('1.234 or 1234')
    expect(parseNumber('1,234', ',')).toEqual({ ok: true, value: 1.234 })
    expect(parseNumber('1,234', '.')).toEqual({ ok: true, value: 1234 })
    expect(parseNumber('1.234', ',')).toEqual({ ok: true, value: 1234 })
  })

  it.each(['', 'abc', '1.2.3,4', '12 34', '1,23,4', '--5', 'NaN', '<0.01', '1e999'])('refuses %s', (text) => {
    expect(parseNumber(text).ok).toBe(false)
  })
})

describe('temperatures', () => {
  it.each([
    ['245 °C', 518.15],
    ['245°C', 518.15],
    ['245 ºC', 518.15],
    ['245 ℃', 518.15],
    ['245 degC', 518.15],
    ['245 deg C', 518.15],
    ['245 C', 518.15],
    ['245,0 °C', 518.15],
    ['518.15 K', 518.15],
    ['−10 °C', 263.15],
    ['473 °F', 518.15],
    ['32 degF', 273.15],
  ])('%s', (text, kelvin) => expect(si(text, 'temperature')).toBeCloseTo(kelvin, 9))
  it('says how a bare C was read, and refuses what lies below absolute zero', () => {
    const reading = parseQuantity('245 C', 'temperature')
    expect(reading.ok && reading.said).toBe('245 °C = 518.15 K; “C” read as °C')
    expect(parseQuantity('-300 °C', 'temperature').ok).toBe(false)
    expect(si('5 °C', 'temperature-difference')).toBe(5)
    expect(si('9 °F', 'temperature-difference')).toBe(5)
    expect(si('5 K/min', 'temperature-rate')).toBeCloseTo(5 / 60, 15)
    expect(si('5 °C/min', 'temperature-rate')).toBeCloseTo(5 / 60, 15)
    expect(si('5 °C min⁻¹', 'temperature-rate')).toBeCloseTo(5 / 60, 15)
  })
})

describe('pressures', () => {
  it.each([
    ['1,3 bar', 130_000, 'unstated'],
    ['1.30 bar abs', 130_000, 'absolute'],
    ['1.3 bara', 130_000, 'absolute'],
    ['1.3 bar(a)', 130_000, 'absolute'],
    ['1.3 bar (abs)', 130_000, 'absolute'],
    ['0.3 barg', 30_000, 'gauge'],
    ['0.3 bar(g)', 30_000, 'gauge'],
    ['0.3 bar g', 30_000, 'gauge'],
    ['0.5 kPag', 500, 'gauge'],
    ['0.5 kPa gauge', 500, 'gauge'],
    ['0.1 MPag', 100_000, 'gauge'],
    ['4.3 psig', 4.3 * 6894.757293168, 'gauge'],
    ['19 psia', 19 * 6894.757293168, 'absolute'],
    ['14.696 psi', 14.696 * 6894.757293168, 'unstated'],
    ['1 atm', 101_325, 'unstated'],
    ['760 Torr', 101_325, 'unstated'],
    ['760 mmHg', 101_325.0144354, 'unstated'],
    ['1013 mbar', 101_300, 'unstated'],
    ['1013 hPa', 101_300, 'unstated'],
    ['1 kgf/cm2', 98_066.5, 'unstated'],
    ['1 kgf cm⁻²', 98_066.5, 'unstated'],
    ['1 at', 98_066.5, 'unstated'],
    ['1 N/m2', 1, 'unstated'],
  ])('%s', (text, pascal, kind) => {
    const reading = parseQuantity(text, 'pressure')
    expect(reading).toMatchObject({ ok: true, pressureKind: kind })
    expect(reading.ok ? reading.valueSi : NaN).toBeCloseTo(pascal, 5)
  })
  it('does not take mPa for MPa, nor a length for a pressure', () => {
    expect(parseQuantity('1 mPa', 'pressure').ok).toBe(false)
    expect(parseQuantity('1 mm', 'pressure').ok).toBe(false)
    expect(parseQuantity('-1 bara', 'pressure').ok).toBe(false)
  })
})

describe('what a person writes as a fraction', () => {
  // the inch is 25.4 mm by definition
  it.each([
    ['1/4 in', 6.35e-3],
    ['1/4"', 6.35e-3],
    ['3/8 inch', 9.525e-3],
    ['1 1/2 in', 38.1e-3],
    ['1-1/2 in', 38.1e-3],
  ])('%s is %d m', (text, metres) => {
    const read = parseQuantity(text, 'length')
    expect(read.ok ? read.valueSi : NaN).toBeCloseTo(metres, 12)
  })
  it('is not divided by nothing, nor taken for a pair of sieves', () => {
    expect(parseQuantity('1/0 in', 'length').ok).toBe(false)
    expect(parseQuantity('60/80 mesh', 'length').ok).toBe(false)
  })
  it('without a unit is a share of one, and more than all of it is asked about', () => {
    expect(parseQuantity('5', 'fraction', { fractionOf: 'mass' })).toEqual({
      ok: false,
      sentence: '“5” without a unit is 500 %; write 5 % if that is meant.',
    })
    expect(parseQuantity('8', 'fraction')).toMatchObject({
      sentence: '“8” without a unit is 800 %; write 8 % if that is meant.',
    })
    expect(parseQuantity('0.05', 'fraction')).toMatchObject({ ok: true, valueSi: 0.05, said: '0.05 = 5 %' })
  })
})

describe('gas flows', () => {
  const normal = { temperatureK: 273.15, pressurePa: 101_325 }
  it.each([
    ['7,2 mL/min', 7.2, null],
    ['60 sccm', 60, null],
    ['60 SCCM', 60, null],
    ['60 smlm', 60, null],
    ['60 mls/min', 60, null],
    ['60 mL/min (STP)', 60, null],
    ['60 mL(STP)/min', 60, null],
    ['60 mL/min STP', 60, null],
    ['60 mL/min (NTP)', 60, null],
    ['60 cm3 min-1', 60, null],
    ['60 cm³ min⁻¹', 60, null],
    ['60 cm^3·min^-1', 60, null],
    ['60 cc/min', 60, null],
    ['60 std. cm3/min', 60, null],
    ['0.06 L/min', 60, null],
    ['3.6 l/h', 60, null],
    ['0.06 slpm', 60, null],
    ['60 mln/min', 60, normal],
    ['60 mlₙ/min', 60, normal],
    ['60 Nml/min', 60, normal],
    ['60 mL/min (n)', 60, normal],
    ['3.6 NL/h', 60, normal],
    ['0.0036 Nm3/h', 60, normal],
    ['0.0036 Nm³/h', 60, normal],
    ['60 mL/min (0 °C, 1013 mbar)', 60, { temperatureK: 273.15, pressurePa: 101_300 }],
    ['60 mL/min (0°C; 101,325 kPa)', 60, normal],
    ['60 mL/min (20 °C, 1 atm)', 60, { temperatureK: 293.15, pressurePa: 101_325 }],
    ['60 sccm @ 25 °C and 1 bar', 60, { temperatureK: 298.15, pressurePa: 100_000 }],
    ['60 mL/min (273.15 K, 1 bar)', 60, { temperatureK: 273.15, pressurePa: 100_000 }],
    // a temperature alone is taken at 101.325 kPa, and that is said
    ['60 mL/min (0 °C)', 60, normal],
  ])('%s', (text, millilitresPerMinute, flowReference) => {
    const reading = parseQuantity(text, 'volume-flow')
    expect(reading).toMatchObject({ ok: true, flowReference })
    expect(reading.ok ? reading.valueSi * 6e7 : NaN).toBeCloseTo(millilitresPerMinute, 10)
  })
  it('asks for the reference state where an amount is wanted', () => {
    const asked = parseQuantity('60 sccm', 'molar-flow')
    expect(asked.ok ? '' : asked.sentence).toContain('at which temperature and pressure')
    // 1 cm3/min at 0 °C and 101.325 kPa is 0.743583890 µmol/s: C58, computed with R exact
    expect(si('60 mln/min', 'molar-flow') * 1e6).toBeCloseTo(60 * 0.74358389, 6)
    expect(si('60 sccm', 'molar-flow', { flowReference: normal }) * 1e6).toBeCloseTo(60 * 0.74358389, 6)
    expect(si('2.5 mmol/min', 'molar-flow')).toBeCloseTo(2.5e-3 / 60, 15)
  })
  it('says what it understood', () => {
    const reading = parseQuantity('7,2 mL/min', 'volume-flow')
    expect(reading.ok && reading.said).toBe('7.2 mL/min, no reference state stated')
  })
  it('refuses nl/min, which can be normal litres or nanolitres', () => {
    expect(parseQuantity('5 nl/min', 'volume-flow').ok).toBe(false)
    expect(parseQuantity('5 m', 'volume-flow').ok).toBe(false)
  })
})

describe('the rest of the trade', () => {
  it.each<[string, Dimension, number]>([
    ['80 mg', 'mass', 80e-6],
    ['0,080 g', 'mass', 80e-6],
    ['12 µg', 'mass', 12e-9],
    ['12 μg', 'mass', 12e-9],
    ['12 ug', 'mass', 12e-9],
    ['180 µm', 'length', 180e-6],
    ['0.25 in', 'length', 0.00635],
    ['80 mesh', 'length', 180e-6],
    ['2 h', 'time', 7_200],
    ['2 hr', 'time', 7_200],
    ['30 sec', 'time', 30],
    ['2 h 30 min', 'time', 9_000],
    ['01:30:05', 'time', 5_405],
    ['26:00:00', 'time', 93_600],
    ['1 µmol g-1 s-1', 'rate-per-mass', 1e-3],
    ['1 μmol g⁻¹ s⁻¹', 'rate-per-mass', 1e-3],
    ['1 umol·g−1·s−1', 'rate-per-mass', 1e-3],
    ['1 µmol/(g s)', 'rate-per-mass', 1e-3],
    ['1 µmol/g/s', 'rate-per-mass', 1e-3],
    ['1 umol g_cat-1 s-1', 'rate-per-mass', 1e-3],
    ['1 mmol g-1 h-1', 'rate-per-mass', 0.27778e-3],
    ['1 mmol gcat-1 h-1', 'rate-per-mass', 0.27778e-3],
    ['1 mol kg-1 h-1', 'rate-per-mass', 0.27778e-3],
    ['1 mol kg^-1 h^-1', 'rate-per-mass', 0.27778e-3],
    ['0.02 s-1', 'frequency', 0.02],
    ['72 h⁻¹', 'frequency', 0.02],
    ['72 1/h', 'frequency', 0.02],
    ['1.2 min-1', 'frequency', 0.02],
    ['1 %/h', 'frequency', 0.01 / 3600],
    ['5 %', 'fraction', 0.05],
    ['5 mol%', 'fraction', 0.05],
    ['5 mol %', 'fraction', 0.05],
    ['5 vol.%', 'fraction', 0.05],
    ['5 Vol.-%', 'fraction', 0.05],
    ['250 ppm', 'fraction', 250e-6],
    ['250 ppmv', 'fraction', 250e-6],
    ['0.05', 'fraction', 0.05],
    ['50 mmol/mol', 'fraction', 0.05],
    ['80 kJ/mol', 'energy-per-amount', 80_000],
    ['80 kJ mol⁻¹', 'energy-per-amount', 80_000],
    ['20 kcal/mol', 'energy-per-amount', 83_680],
    ['1 eV', 'energy-per-amount', 96_485.332],
    ['9622 K', 'energy-per-amount', 80_001.759],
    ['120 m²/g', 'area-per-mass', 120_000],
    ['120 m2 g-1', 'area-per-mass', 120_000],
    ['1.2 g/cm3', 'density', 1_200],
    ['0.4 cm³/g', 'volume-per-mass', 4e-4],
    ['50 µmol/g', 'amount-per-mass', 0.05],
    ['0.2 W/(m K)', 'thermal-conductivity', 0.2],
    ['0.2 W m-1 K-1', 'thermal-conductivity', 0.2],
    ['0.2 cm2/s', 'diffusivity', 2e-5],
    ['44.01 g/mol', 'molar-mass', 0.04401],
  ])('%s', (text, dimension, value) => {
    expect(si(text, dimension) / value).toBeCloseTo(1, 4)
  })

  it.each<[string, Dimension]>([
    ['60', 'volume-flow'],
    ['1:30', 'time'],
    ['5 furlongs', 'length'],
    ['1 µmol/g s', 'rate-per-mass'],
    ['1 Mol/kg/s', 'rate-per-mass'],
    ['1 mol gmetal-1 h-1', 'rate-per-mass'],
    ['1 g gcat-1 h-1', 'rate-per-mass'],
    ['3 M', 'length'],
    ['abc', 'mass'],
    ['', 'mass'],
  ])('refuses %s with a sentence', (text, dimension) => {
    const reading = parseQuantity(text, dimension)
    expect(reading.ok).toBe(false)
    expect(reading.ok ? '' : reading.sentence.length).toBeGreaterThan(20)
  })

  it('keeps fractions by mass and by amount apart', () => {
    expect(parseQuantity('250 ppmw', 'fraction', { fractionOf: 'amount' }).ok).toBe(false)
    expect(si('1 wt%', 'fraction', { fractionOf: 'mass' })).toBe(0.01)
    expect(parseQuantity('1 mol gmetal-1 h-1', 'rate-per-mass', { massOf: 'metal' }).ok).toBe(true)
  })

  it('takes a unit for bare numbers from the caller', () => {
    expect(si('80', 'mass', { defaultUnit: 'mg' })).toBe(80e-6)
  })

  it('never reads m as minutes or M as mega', () => {
    expect(unitFromAlias('m', 'time')).toBeNull()
    expect(unitFromAlias('mL/m', 'volume-flow')).toBeNull()
    expect(unitFromAlias('Mg', 'mass')).toBeNull()
    expect(unitFromAlias('MOL', 'molar-flow')).toBeNull()
  })
})

describe('ranges', () => {
  it.each([
    ['125 to 180 µm', 125e-6, 180e-6],
    ['125-180 µm', 125e-6, 180e-6],
    ['125 – 180 µm', 125e-6, 180e-6],
    ['125 µm to 0,18 mm', 125e-6, 180e-6],
    ['180 … 125 µm', 125e-6, 180e-6],
    ['60/80 mesh', 180e-6, 250e-6],
    ['60-80 mesh', 180e-6, 250e-6],
    ['150 µm', 150e-6, 150e-6],
  ])('%s', (text, low, high) => {
    const reading = parseRange(text, 'length')
    expect(reading.ok).toBe(true)
    if (!reading.ok) return
    expect(reading.lowSi).toBeCloseTo(low, 12)
    expect(reading.highSi).toBeCloseTo(high, 12)
  })
  it('reads negative temperatures', () => {
    expect(parseRange('-10 to 20 °C', 'temperature')).toMatchObject({ lowSi: 263.15, highSi: 293.15 })
  })
  it('says what is missing', () => {
    expect(parseRange('125 to 180', 'length').ok).toBe(false)
    expect(parseRange('to 180 µm', 'length').ok).toBe(false)
  })
})
