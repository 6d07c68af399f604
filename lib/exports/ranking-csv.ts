import { type Ranking } from '../domain/ranking'
import { defuseFormula } from './defuse-formula'
import { rankingColumns } from './ranking-table'

function cell(value: string | number | null): string {
  if (value === null) return ''
  // the shortest text that reads back to the same double: nothing is rounded in a file for machines
  if (typeof value === 'number') return String(value)
  return `"${defuseFormula(value.replace(/[\r\n]+/g, ' ')).replaceAll('"', '""')}"`
}

/** The ranking as RFC 4180 text, UTF-8 with a byte-order mark so that spreadsheet programs read the units. */
export function rankingCsv(ranking: Ranking): string {
  const columns = rankingColumns(ranking)
  const lines = [
    columns.map((column) => cell(column.header)).join(','),
    ...ranking.rows.map((row) => columns.map((column) => cell(column.value(row))).join(',')),
  ]
  return `\uFEFF${lines.join('\r\n')}\r\n`
}
