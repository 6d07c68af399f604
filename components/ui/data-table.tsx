import { type ReactNode } from 'react'
import { classNames } from './class-names'

export interface DataColumn<Row> {
  readonly key: string
  readonly head: ReactNode
  /** set under the head, smaller */
  readonly unit?: string
  /** right-aligned, tabular figures */
  readonly isNumber?: boolean
  /** names the row for those who hear the table */
  readonly isRowHead?: boolean
  readonly cell: (row: Row) => ReactNode
  readonly className?: string
}

/** A plain table: hairlines, numbers on one edge, its own sideways scroll when the screen is narrow. */
export function DataTable<Row>({
  caption,
  isCaptionShown = false,
  columns,
  rows,
  rowKey,
  empty,
}: {
  readonly caption: string
  readonly isCaptionShown?: boolean
  readonly columns: readonly DataColumn<Row>[]
  readonly rows: readonly Row[]
  readonly rowKey: (row: Row) => string
  /** one sentence for a table without rows */
  readonly empty?: string
}) {
  return (
    <div className="relative overflow-x-auto" role="region" aria-label={caption} tabIndex={0}>
      <table className="w-full border-collapse">
        <caption className={isCaptionShown ? 'pb-2 text-left font-head text-[17px] font-[560]' : 'sr-only'}>
          {caption}
        </caption>
        <thead>
          <tr className="border-b border-line-strong">
            {columns.map((column) => (
              <th
                key={column.key}
                scope="col"
                className={classNames(
                  'px-2.5 py-1.5 align-bottom text-[13px] font-semibold first:pl-0 last:pr-0',
                  column.isNumber === true ? 'text-right' : 'text-left',
                )}
              >
                {column.head}
                {column.unit === undefined ? null : (
                  <span className="block text-[12px] font-normal text-ink-2">{column.unit}</span>
                )}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.length === 0 ? (
            <tr>
              <td colSpan={columns.length} className="py-3 text-ink-2">
                {empty ?? 'Nothing here yet.'}
              </td>
            </tr>
          ) : (
            rows.map((row) => (
              <tr key={rowKey(row)} className="border-b border-line hover:bg-well">
                {columns.map((column) => {
                  const className = classNames(
                    'px-2.5 py-1.5 align-top first:pl-0 last:pr-0',
                    column.isNumber === true ? 'text-right whitespace-nowrap' : 'text-left',
                    column.className,
                  )
                  return column.isRowHead === true ? (
                    <th key={column.key} scope="row" className={classNames(className, 'font-normal')}>
                      {column.cell(row)}
                    </th>
                  ) : (
                    <td key={column.key} className={className}>
                      {column.cell(row)}
                    </td>
                  )
                })}
              </tr>
            ))
          )}
        </tbody>
      </table>
    </div>
  )
}
