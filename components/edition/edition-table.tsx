import { DataTable, type DataColumn } from '@/components/ui/data-table'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { CautionTag } from '@/components/working/caution-tag'
import { type EditionContent } from '@/lib/domain/edition'

type Frozen = EditionContent['ranking']
type Row = Frozen['rows'][number]

const half = (interval: readonly [number, number] | null | undefined, factor: number) =>
  interval === null || interval === undefined ? null : ((interval[1] - interval[0]) / 2) * factor

/** Value with half of its interval, in practical units. */
function number(
  head: string,
  unit: string,
  factor: number,
  value: (row: Row) => number | undefined,
  interval: (row: Row) => readonly [number, number] | null | undefined,
): DataColumn<Row> {
  return {
    key: head,
    head,
    unit,
    isNumber: true,
    cell: (row) => {
      const found = value(row)
      return found === undefined ? (
        '–'
      ) : (
        <ValueWithUncertainty value={found * factor} uncertainty={half(interval(row), factor)} />
      )
    },
  }
}

/** A ranked table as it was frozen. */
export function EditionTable({ ranking, caption }: { readonly ranking: Frozen; readonly caption: string }) {
  return (
    <DataTable
      caption={caption}
      rows={ranking.rows}
      rowKey={(row) => row.sampleId}
      columns={[
        { key: 'rank', head: 'Rank', isNumber: true, cell: (row) => row.rank ?? '–' },
        {
          key: 'interval',
          head: '90 % of draws',
          cell: (row) =>
            row.rankInterval === null
              ? '–'
              : row.rankInterval[0] === row.rankInterval[1]
                ? String(row.rankInterval[0])
                : `${row.rankInterval[0]} to ${row.rankInterval[1]}`,
        },
        {
          key: 'sample',
          head: 'Sample',
          isRowHead: true,
          cell: (row) => (
            <>
              <b className="font-semibold">{row.sampleCode}</b>
              <span className="block min-w-32 text-[12.5px] text-ink-2">{row.sampleName}</span>
            </>
          ),
        },
        number(
          'TOF',
          '10⁻³ s⁻¹',
          1e3,
          (row) => row.turnoverFrequencyPerS?.value,
          (row) => row.turnoverFrequencyInterval,
        ),
        number(
          'Rate',
          'µmol g⁻¹ s⁻¹',
          1e3,
          (row) => row.rateMolPerKgS?.value,
          (row) => row.rateInterval,
        ),
        number(
          'Ea',
          'kJ mol⁻¹',
          1e-3,
          (row) => row.activationEnergyJPerMol?.value,
          (row) => row.activationEnergyInterval,
        ),
        number(
          'ln A',
          'A in mol kg⁻¹ s⁻¹',
          1,
          (row) => row.lnPreExponential?.value,
          (row) => row.lnPreExponentialInterval,
        ),
        number(
          'Carbon',
          'out/in',
          1,
          (row) => row.carbonBalance?.value,
          (row) => row.carbonBalanceInterval,
        ),
        {
          key: 'cautions',
          head: 'Cautions',
          cell: (row) =>
            !row.runs.some((run) => run.isIncluded) ? (
              <span className="text-ink-2">no decided run counts</span>
            ) : row.cautions.length === 0 ? (
              <span className="text-ink-2">none</span>
            ) : (
              <span className="flex flex-wrap gap-1">
                {row.cautions.map((caution, index) => (
                  <CautionTag key={`${caution.code}-${String(index)}`} caution={caution} />
                ))}
              </span>
            ),
        },
        {
          key: 'runs',
          head: 'Runs',
          cell: (row) =>
            row.runs
              .filter((run) => run.isIncluded)
              .map((run) => run.code)
              .join(', '),
        },
      ]}
    />
  )
}
