import { parseNumber } from '../analysis/units/parse-number'
import { type CalibrationEntry } from '../domain/calibration'
import { AppError } from '../domain/errors'
import { SpeciesWords } from './column-map/species-words'
import { detectFile } from './read-file'

export type ResponseConvention = 'factor' | 'sensitivity'

export interface ResponseFactorTable {
  readonly entries: readonly CalibrationEntry[]
  /** null when the header does not say whether a number is an amount per area or an area per amount: then a person must */
  readonly convention: ResponseConvention | null
  readonly header: string
}

const AMOUNT = /\b(mole?s?|amount|fraction|concentration|ppm|%|vol|stoffmenge)/i
const AREA = /\b(area|areas|count|counts|fl(ä|ae?)che|peak)/i
const UNCERTAINTY = /(uncert|std|s\.?d\.?|rsd|unsicher|± |±)/i

/** `mole fraction per area count` is a factor, `area per mole fraction` a sensitivity; anything else says nothing. */
export function conventionOf(header: string): ResponseConvention | null {
  const parts = header.split(/\s+per\s+|\s+pro\s+|\//i)
  const [above, below] = [parts[0] ?? '', parts.slice(1).join(' ')]
  if (below === '') return null
  if (AMOUNT.test(above) && AREA.test(below)) return 'factor'
  if (AREA.test(above) && AMOUNT.test(below)) return 'sensitivity'
  return null
}

/** A table of response factors: a column of species, a column of numbers, and perhaps one of their relative standard uncertainties. */
export async function readResponseFactors(file: string, name: string): Promise<ResponseFactorTable> {
  const { detections, problems } = await detectFile(file, { rigTimeZone: '', barometerPa: null, species: [] })
  const found = detections[0]
  if (found === undefined)
    throw new AppError('unprocessable', problems[0]?.sentence ?? `${name} holds no table that could be read.`)
  const words = new SpeciesWords([])
  const { decimalMark } = found.proposal
  const width = found.headers.length
  const cellsOf = (column: number) => found.firstRows.map((row) => (row[column] ?? '').trim())
  const speciesColumn = Array.from({ length: width }, (_, column) => column).find((column) =>
    cellsOf(column).every((cell) => words.named(cell) !== null),
  )
  if (speciesColumn === undefined)
    throw new AppError(
      'unprocessable',
      `${name}: no column holds nothing but species. Expected one row a species, its formula in one column (CO2, CH4, …) and its response factor in another.`,
    )
  const numeric = Array.from({ length: width }, (_, column) => column).filter(
    (column) => column !== speciesColumn && cellsOf(column).every((cell) => parseNumber(cell, decimalMark).ok),
  )
  const valueColumn = numeric.find((column) => !UNCERTAINTY.test(found.headers[column] ?? ''))
  if (valueColumn === undefined)
    throw new AppError('unprocessable', `${name}: no column of numbers stands beside the species.`)
  const uncertaintyColumn = numeric.find((column) => UNCERTAINTY.test(found.headers[column] ?? ''))
  const header = found.headers[valueColumn] ?? ''
  const entries = found.firstRows.map((row, index): CalibrationEntry => {
    const value = parseNumber(row[valueColumn] ?? '', decimalMark)
    const uncertainty = uncertaintyColumn === undefined ? null : parseNumber(row[uncertaintyColumn] ?? '', decimalMark)
    if (!value.ok || !(value.value > 0))
      throw new AppError(
        'unprocessable',
        `${name}, row ${index + 1}: “${row[valueColumn] ?? ''}” is not a number above zero, as a response factor is.`,
      )
    const isPercent = uncertaintyColumn !== undefined && /%/.test(found.headers[uncertaintyColumn] ?? '')
    return {
      species: words.named(row[speciesColumn] ?? ''),
      value: value.value,
      unit: header.slice(0, 60),
      relativeStandardUncertainty:
        uncertainty !== null && uncertainty.ok ? uncertainty.value / (isPercent ? 100 : 1) : null,
      absoluteStandardUncertainty: null,
    }
  })
  return { entries, convention: conventionOf(header), header }
}
