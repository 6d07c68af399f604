import { dimensionsOf } from '../../domain/column-dimensions'
import { type ColumnMapSpecification, type MappedColumn } from '../../domain/column-map'
import { type Problem } from '../../domain/intake'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { problem } from '../problem-list'

/** What is wrong with a column map itself: a clock that is missing, a unit that is none. With any of these the file cannot be read. */
export function specificationFaults(specification: ColumnMapSpecification): Problem[] {
  if (specification.kind === 'attachment') return []
  const faults: Problem[] = []
  const columns = specification.columns
  const has = (meaning: MappedColumn['meaning']) => columns.some((column) => column.meaning === meaning)
  if (!has('time') && !(has('date') && has('time-of-day')) && !has('elapsed-time') && !has('time-of-day'))
    faults.push(
      missing(
        'a column with the time',
        'No column is marked as the time. Mark date and time, or the elapsed time, in the table of columns.',
      ),
    )
  if (specification.kind === 'rig-log' && !has('bed-temperature'))
    faults.push(
      missing(
        'a column with the bed temperature',
        'No column is marked as the temperature of the bed. Mark it in the table of columns.',
      ),
    )
  if (specification.kind === 'analyser') {
    if (!has('area') && !has('mole-fraction'))
      faults.push(
        missing(
          'a column with areas or mole fractions',
          'No column is marked as area or mole fraction. Mark the results in the table of columns.',
        ),
      )
    if (has('area') && has('mole-fraction'))
      faults.push(
        missing(
          'areas or mole fractions',
          'Both areas and mole fractions are marked. One of the two is read: set the other columns to “not read”.',
        ),
      )
    if (specification.shape === 'long' && !has('species-name'))
      faults.push(
        missing(
          'a column that names the species',
          'The table has one row a peak, but no column is marked as the name of the species.',
        ),
      )
  }
  for (const column of columns) {
    // `12:30:05` is its own unit; numbers need one, which is told when they are read
    const isOwnUnit = column.meaning === 'elapsed-time' && column.unit === ''
    const dimensions = isOwnUnit ? [] : dimensionsOf(column.meaning)
    if (dimensions.length > 0 && !dimensions.some((dimension) => unitFromAlias(column.unit, dimension) !== null))
      faults.push(
        problem({
          code: 'unknown-unit',
          severity: 'problem',
          column: column.header,
          found: column.unit === '' ? 'no unit' : column.unit,
          expected: `a unit of ${dimensions.join(' or ').replace('-', ' ')}`,
          sentence:
            column.unit === ''
              ? `“${column.header}” states no unit. Write it in the table of columns.`
              : `“${column.unit}” of column “${column.header}” is not a unit of ${dimensions.join(' or ').replace('-', ' ')} that is known here. Write it in the table of columns.`,
        }),
      )
    if (needsSpecies(column, specification) && column.species === null)
      faults.push(
        problem({
          code: 'unknown-species',
          severity: 'problem',
          column: column.header,
          expected: 'a species',
          sentence: `“${column.header}” does not say which species it is about. Choose one in the table of columns, or set the column to “not read”.`,
        }),
      )
  }
  const twice = new Set<string>()
  for (const column of columns) {
    if (column.meaning === 'ignore' || column.meaning === 'text') continue
    const key = `${column.meaning} ${column.species ?? ''} ${column.channel ?? ''}`
    if (twice.has(key))
      faults.push(
        problem({
          code: 'missing-column',
          severity: 'problem',
          column: column.header,
          expected: 'one column for each meaning',
          sentence: `“${column.header}” means the same as another column. Set one of the two to “not read”.`,
        }),
      )
    twice.add(key)
  }
  return faults
}

function missing(expected: string, sentence: string): Problem {
  return problem({ code: 'missing-column', severity: 'problem', expected, sentence })
}

function needsSpecies(column: MappedColumn, specification: ColumnMapSpecification): boolean {
  if (column.meaning === 'flow') return true
  return specification.shape === 'wide' && (column.meaning === 'area' || column.meaning === 'mole-fraction')
}
