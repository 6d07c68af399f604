import { type ColumnMapSpecification, type MappedColumn } from '../../domain/column-map'
import { type FileReading, type Problem } from '../../domain/intake'
import { type ProblemInput, ProblemList } from '../problem-list'

export interface AppliedReading extends FileReading {
  /** true where rows lie in an hour that the clock shows twice and nothing tells which */
  readonly hasUnsettledHour: boolean
}

export function emptyReading(specification: ColumnMapSpecification, problems: readonly Problem[]): AppliedReading {
  return {
    kind: specification.kind === 'analyser' ? 'injections' : 'rig-log',
    rowCount: 0,
    channels: [],
    problems,
    specification,
    hasUnsettledHour: false,
  }
}

export function nothingRead(rowCount: number): readonly Problem[] {
  if (rowCount > 0) return []
  const list = new ProblemList()
  list.add({
    code: 'empty-file',
    severity: 'fatal',
    expected: 'at least one row with a time',
    sentence:
      'Not a single row could be read with these meanings and units. Compare them with the first rows of the file.',
  })
  return list.list()
}

export function notNumber(line: number, column: MappedColumn, found: string, mark: '.' | ','): ProblemInput {
  return {
    code: 'not-a-number',
    severity: 'problem',
    line,
    column: column.header,
    found,
    expected: `a number with a decimal ${mark === '.' ? 'point' : 'comma'}, or a marker for a missing value`,
    sentence: `Line ${String(line)}, “${column.header}”: “${found.slice(0, 60)}” is not a number with a decimal ${mark === '.' ? 'point' : 'comma'}. The value is taken as missing.`,
  }
}

/** A column of injection numbers has none in this row. The place that stands in for it can be a number that another injection has. */
export function notNumbered(line: number, column: MappedColumn, found: string, place: number): ProblemInput {
  return {
    code: 'not-a-number',
    severity: 'problem',
    line,
    column: column.header,
    found,
    expected: 'the number of the injection',
    sentence: `Line ${String(line)}, “${column.header}”: “${found.slice(0, 60)}” is not the number of an injection. It is counted by its place, as ${String(place)}.`,
  }
}

export function overRange(line: number, column: MappedColumn, found: string): ProblemInput {
  return {
    code: 'out-of-range',
    severity: 'note',
    line,
    column: column.header,
    found,
    expected: 'a number',
    sentence: `Line ${String(line)}, “${column.header}”: the instrument was out of its range (“${found.slice(0, 40)}”). The value is taken as missing.`,
  }
}
