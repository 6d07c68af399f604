import { DataTable } from '@/components/ui/data-table'
import { Tag } from '@/components/ui/tag'
import { type CheckReport } from '@/lib/analysis/validation/check'
import { errorText, longNumber } from './number-text'

/** Numbers of one check: what they must be, what the code gives, how far apart. */
export function CheckTable({ report }: { readonly report: CheckReport }) {
  return (
    <DataTable
      caption={`${report.id} ${report.title}`}
      rows={report.results.map((result, index) => ({ ...result, key: String(index) }))}
      rowKey={({ key }) => key}
      columns={[
        {
          key: 'quantity',
          head: 'Number',
          isRowHead: true,
          cell: ({ quantity }) => quantity,
          className: 'min-w-[11rem]',
        },
        { key: 'unit', head: 'Unit', cell: ({ unit }) => (unit === '1' ? '' : unit), className: 'whitespace-nowrap' },
        { key: 'expected', head: 'Expected', isNumber: true, cell: ({ expected }) => longNumber(expected) },
        { key: 'obtained', head: 'Obtained', isNumber: true, cell: ({ obtained }) => longNumber(obtained) },
        { key: 'error', head: 'Relative error', isNumber: true, cell: ({ relativeError }) => errorText(relativeError) },
        { key: 'tolerance', head: 'Allowed', isNumber: true, cell: ({ tolerance }) => errorText(tolerance) },
        {
          key: 'verdict',
          head: 'Agrees',
          cell: ({ passes }) => <Tag kind={passes ? 'sound' : 'fault'}>{passes ? 'yes' : 'no'}</Tag>,
        },
      ]}
    />
  )
}
