import 'server-only'
import writeXlsxFile, { type SheetData } from 'write-excel-file/node'
import { type MethodSettings } from '../domain/method'
import { type Ranking } from '../domain/ranking'
import { rankingColumns } from './ranking-table'

const heading = (text: string) => ({ value: text, type: String, fontWeight: 'bold' as const, wrap: true })
// text cells are always typed as text, so that nothing in them can be taken for a formula
const text = (value: string) => ({ value, type: String })

/**
 * The ranking as a workbook: typed cells with a frozen header, and a second sheet with the method, the cautions and what was left out.
 *
 * Numbers are written as numbers at full precision; how many digits to show is the reader's choice.
 */
export async function rankingWorkbook(ranking: Ranking, settings: MethodSettings): Promise<Buffer> {
  const columns = rankingColumns(ranking)
  const table: SheetData = [
    columns.map((column) => heading(column.header)),
    ...ranking.rows.map((row) =>
      columns.map((column) => {
        const value = column.value(row)
        if (value === null) return null
        return typeof value === 'number' ? { value, type: Number } : text(value)
      }),
    ),
  ]
  const notes: SheetData = [
    [heading('Campaign'), text(`${ranking.campaignCode} ${ranking.campaignName}`)],
    [heading('Method version'), { value: ranking.methodNumber, type: Number }],
    [heading('Computed at'), text(ranking.computedAt)],
    [heading('Engine'), text(ranking.engineId)],
    [heading('Draws'), { value: ranking.draws, type: Number }],
    [heading('Seed of the draws'), { value: ranking.seed, type: Number }],
    [heading('Provisional runs'), text(ranking.includesProvisional ? 'included' : 'left out')],
    [],
    [heading('Method setting'), heading('Value')],
    ...Object.entries(settings).map(([name, value]) => [
      text(name),
      typeof value === 'number'
        ? { value, type: Number }
        : text(typeof value === 'string' ? value : JSON.stringify(value)),
    ]),
    [],
    [heading('Sample'), heading('Caution'), heading('Value'), heading('Limit'), heading('Source of the limit')],
    ...ranking.rows.flatMap((row) =>
      row.cautions.map((caution) => [
        text(row.sampleCode),
        text(caution.sentence),
        caution.value === null ? null : { value: caution.value, type: Number },
        caution.limit === null ? null : { value: caution.limit, type: Number },
        text(caution.source),
      ]),
    ),
    [],
    [heading('Sample'), heading('Run left out'), heading('Reason')],
    ...ranking.rows.flatMap((row) =>
      row.runs.filter((run) => !run.isIncluded).map((run) => [text(row.sampleCode), text(run.code), text(run.reason)]),
    ),
  ]
  return writeXlsxFile([
    { data: table, sheet: 'Ranking', stickyRowsCount: 1, columns: columns.map(() => ({ width: 18 })) },
    {
      data: notes,
      sheet: 'Method and notes',
      columns: [{ width: 34 }, { width: 60 }, { width: 16 }, { width: 16 }, { width: 50 }],
    },
  ]).toBuffer()
}
