import {
  type ColDef,
  type ColGroupDef,
  type ICellRendererParams,
  type IRowNode,
  type ValueGetterParams,
} from 'ag-grid-community'
import { createElement } from 'react'
import { type Estimate } from '@/lib/analysis/estimate'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { formatFixed } from '@/components/numbers/format-fixed'
import { halfWidth } from '@/components/numbers/half-width'
import { practicalUnits, type PracticalUnit } from '@/components/numbers/practical-units'
import { speciesLabel } from '@/components/numbers/species-label'
import { type IntervalScale } from './interval-scale'
import {
  CautionsCell,
  ColumnHeader,
  DecisionCell,
  IntervalCell,
  PlainNumberCell,
  QuantityCell,
  RankIntervalCell,
  SampleCell,
  SpanCell,
} from './ranking-cells'
import { type RankingGridRow } from './ranking-grid-row'

type Column = ColDef<RankingGridRow>
type Group = ColGroupDef<RankingGridRow>

const GROUP_CLASS = 'ranking-group'

/** What the person may write. The server refuses the rest, whatever the grid allows. */
export interface RankingPermissions {
  readonly canRemark: boolean
  readonly canShortlist: boolean
  readonly canDecide: boolean
}

/** Missing numbers come last, whichever way the column is sorted. */
export function compareNumbers(
  a: unknown,
  b: unknown,
  _nodeA?: IRowNode<RankingGridRow>,
  _nodeB?: IRowNode<RankingGridRow>,
  isDescending = false,
): number {
  const isNumberA = typeof a === 'number' && Number.isFinite(a)
  const isNumberB = typeof b === 'number' && Number.isFinite(b)
  if (isNumberA && isNumberB) return a - b
  if (!isNumberA && !isNumberB) return 0
  const lastly = isDescending ? -1 : 1
  return isNumberA ? -lastly : lastly
}

const numeric = {
  filter: 'agNumberColumnFilter',
  // an exact value is hardly ever met by a measured number
  filterParams: { defaultOption: 'greaterThanOrEqual', maxNumConditions: 2 },
  comparator: compareNumbers,
  type: 'rightAligned',
  cellDataType: 'number',
} as const

const header = (unit: string, scale: IntervalScale | null = null) => ({
  headerComponentParams: { innerHeaderComponent: ColumnHeader, innerHeaderComponentParams: { unit, scale } },
})

const rowOf = (parameters: ValueGetterParams<RankingGridRow> | ICellRendererParams<RankingGridRow>) =>
  parameters.data?.row

/** Why a number of this column, or its uncertainty, is missing; empty where the row does not say. */
export function whyMissing(row: RankingRow, colId: string): string {
  return row.cannotTell[colId] ?? (colId.startsWith('selectivity.') ? (row.cannotTell['selectivity'] ?? '') : '')
}

/** A value with half its interval behind ±; where one of the two is missing the cell says so and why. */
function quantity(
  colId: string,
  headerName: string,
  unit: PracticalUnit,
  read: (row: RankingRow) => {
    estimate: Estimate | null | undefined
    interval: readonly [number, number] | null | undefined
  },
  more: Column = {},
): Column {
  const half = (row: RankingRow) => {
    const width = halfWidth(read(row).interval ?? null)
    return width === null ? null : unit.differenceFromSi(width)
  }
  return {
    ...numeric,
    ...header(unit.label),
    colId,
    headerName,
    width: 84,
    valueGetter: (parameters) => {
      const row = rowOf(parameters)
      const estimate = row ? read(row).estimate : null
      return estimate ? unit.fromSi(estimate.value) : null
    },
    cellRenderer: (parameters: ICellRendererParams<RankingGridRow>) => {
      const row = rowOf(parameters)
      const value: unknown = parameters.value
      return createElement(QuantityCell, {
        value: typeof value === 'number' ? value : null,
        half: row ? half(row) : null,
        why: row ? whyMissing(row, colId) : '',
        isBlank: row?.kind === 'blank',
      })
    },
    ...more,
  }
}

/** A count, which has no uncertainty. */
function plain(
  colId: string,
  headerName: string,
  unit: string,
  decimals: number,
  read: (row: RankingRow) => number | null,
  more: Column = {},
): Column {
  return {
    ...numeric,
    ...header(unit),
    colId,
    headerName,
    width: 84,
    valueGetter: (parameters) => {
      const row = rowOf(parameters)
      return row ? read(row) : null
    },
    cellRenderer: (parameters: ICellRendererParams<RankingGridRow>) => {
      const value: unknown = parameters.value
      return createElement(PlainNumberCell, { value: typeof value === 'number' ? value : null, decimals })
    },
    ...more,
  }
}

/** Probability in words at the ends: a draw count cannot tell 1 from 0.9999. */
export function formatProbability(probability: number | null): string {
  if (probability === null || !Number.isFinite(probability)) return '–'
  if (probability > 0.99) return '> 0.99'
  if (probability < 0.01) return '< 0.01'
  return formatFixed(probability, 2)
}

/** Species whose selectivity any sample states, the most abundant first. */
export function selectivitySpecies(rows: readonly RankingRow[]): string[] {
  const largest = new Map<string, number>()
  for (const row of rows) {
    for (const [species, { value }] of Object.entries(row.selectivity)) {
      largest.set(species, Math.max(largest.get(species) ?? 0, value))
    }
  }
  return [...largest].sort((a, b) => b[1] - a[1]).map(([species]) => species)
}

/** Rank and sample stay in sight while the rest is scrolled; on a narrow screen only the sample does. */
function rankColumns(isNarrow: boolean): Column[] {
  return [
    {
      ...numeric,
      colId: 'rank',
      ...header(''),
      headerName: 'Rank',
      width: 62,
      pinned: isNarrow ? null : 'left',
      sort: 'asc',
      valueGetter: (parameters) => rowOf(parameters)?.rank ?? null,
      cellRenderer: (parameters: ICellRendererParams<RankingGridRow>) => {
        const value: unknown = parameters.value
        return createElement(PlainNumberCell, { value: typeof value === 'number' ? value : null, decimals: 0 })
      },
    },
    {
      ...numeric,
      type: [],
      colId: 'rankInterval',
      ...header('of draws'),
      headerName: '90 %',
      headerTooltip: 'Ranks in the middle nine of ten draws',
      width: 88,
      pinned: isNarrow ? null : 'left',
      valueGetter: (parameters) => rowOf(parameters)?.rankInterval?.[0] ?? null,
      cellRenderer: RankIntervalCell,
    },
    {
      colId: 'sample',
      headerName: 'Sample',
      width: isNarrow ? 140 : 152,
      autoHeight: true,
      pinned: 'left',
      filter: 'agTextColumnFilter',
      valueGetter: (parameters) => {
        const row = rowOf(parameters)
        return row ? `${row.sampleCode} ${row.sampleName}` : ''
      },
      cellRenderer: SampleCell,
      comparator: (a: unknown, b: unknown) => String(a).localeCompare(String(b), 'en', { numeric: true }),
    },
  ]
}

/** The quantity that ranks comes first, the other one further right. */
function rateGroups(ranking: Ranking): { first: Group; second: Group } {
  const celsius = formatFixed(ranking.referenceTemperatureK - 273.15, 1).replace('.0', '')
  const best = plain('probabilityBest', 'P(best)', '', 2, (row) => row.probabilityBest, {
    width: 58,
    cellRenderer: (parameters: ICellRendererParams<RankingGridRow>) => {
      const probability = rowOf(parameters)?.probabilityBest ?? null
      return createElement(
        'span',
        { className: probability !== null && probability < 0.01 ? 'text-ink-3' : '' },
        formatProbability(probability),
      )
    },
  })
  const turnover: Group = {
    groupId: 'turnover-frequency',
    headerName: `at ${celsius} °C`,
    headerClass: GROUP_CLASS,
    children: [
      quantity('turnoverFrequencyPerS', 'TOF', practicalUnits.turnoverFrequency, (row) => ({
        estimate: row.turnoverFrequencyPerS,
        interval: row.turnoverFrequencyInterval,
      })),
      ...(ranking.rankedBy === 'turnover-frequency' ? [best] : []),
    ],
  }
  const rate: Group = {
    groupId: 'rate',
    headerName: `at ${celsius} °C`,
    headerClass: GROUP_CLASS,
    children: [
      quantity('rateMolPerKgS', 'Rate', practicalUnits.rate, (row) => ({
        estimate: row.rateMolPerKgS,
        interval: row.rateInterval,
      })),
      ...(ranking.rankedBy === 'rate' ? [best] : []),
    ],
  }
  return ranking.rankedBy === 'turnover-frequency'
    ? { first: turnover, second: rate }
    : { first: rate, second: turnover }
}

function slopeGroup(ranking: Ranking, scale: IntervalScale | null): Group {
  const percent = formatFixed(ranking.confidenceLevel * 100, 1).replace('.0', '')
  return {
    groupId: 'activation-energy',
    headerName: 'apparent activation energy',
    headerClass: GROUP_CLASS,
    children: [
      quantity('activationEnergyJPerMol', 'Ea', practicalUnits.activationEnergy, (row) => ({
        estimate: row.activationEnergyJPerMol,
        interval: row.activationEnergyInterval,
      })),
      {
        ...numeric,
        ...header('', scale),
        type: [],
        colId: 'activationEnergyInterval',
        headerName: `${percent} % interval`,
        width: 92,
        filter: false,
        valueGetter: (parameters) => rowOf(parameters)?.activationEnergyInterval?.[0] ?? null,
        cellRenderer: IntervalCell,
      },
      quantity(
        'lnPreExponential',
        'ln A',
        practicalUnits.lnPreExponential,
        (row) => ({
          estimate: row.lnPreExponential,
          interval: row.lnPreExponentialInterval,
        }),
        // the unit of A itself: it stands under ln A
        { width: 92, ...header('mol kg⁻¹ s⁻¹') },
      ),
    ],
  }
}

function stateGroup(ranking: Ranking): Group {
  const target = ranking.targetConversion
  const at = target === undefined ? '' : ` ${String(Number((target * 100).toPrecision(3)))} %`
  return {
    groupId: 'conversion',
    headerName: target === undefined ? 'at equal conversion, and on stream' : `at X =${at}, and on stream`,
    headerClass: GROUP_CLASS,
    children: [
      quantity(
        'temperatureForConversionK',
        'T for X',
        practicalUnits.temperature,
        (row) => ({ estimate: row.temperatureForConversionK, interval: row.temperatureForConversionInterval }),
        { width: 102 },
      ),
      ...selectivitySpecies(ranking.rows).map((species) =>
        quantity(
          `selectivity.${species}`,
          `S(${speciesLabel(species)})`,
          practicalUnits.carbonPercent,
          (row) => ({ estimate: row.selectivity[species], interval: row.selectivityIntervals[species] }),
          { width: 98 },
        ),
      ),
      quantity('decayPerH', 'Decay', practicalUnits.percentPerHour, (row) => ({
        estimate: row.decayPerH,
        interval: row.decayInterval,
      })),
      plain('distinctTemperatures', 'Temps', '', 0, (row) => row.distinctTemperatures, { width: 78 }),
      {
        ...numeric,
        ...header('°C'),
        colId: 'span',
        headerName: 'Span',
        width: 124,
        valueGetter: (parameters) => {
          const row = rowOf(parameters)
          return row?.lowestTemperatureK == null ? null : row.lowestTemperatureK - 273.15
        },
        cellRenderer: SpanCell,
      },
    ],
  }
}

const carbonColumn = quantity(
  'carbonBalance',
  'Carbon',
  practicalUnits.carbonBalance,
  (row) => ({ estimate: row.carbonBalance, interval: row.carbonBalanceInterval }),
  { width: 96 },
)

/** Doubts and decisions; and the cells that people write. */
function judgementColumns(permissions: RankingPermissions): { doubts: Column[]; written: Column[] } {
  const doubts: Column[] = [
    carbonColumn,
    {
      colId: 'cautions',
      headerName: 'Cautions',
      width: 132,
      filter: 'agTextColumnFilter',
      autoHeight: true,
      valueGetter: (parameters) =>
        rowOf(parameters)
          ?.cautions.map((caution) => caution.tag)
          .join(', ') ?? '',
      cellRenderer: CautionsCell,
    },
    {
      colId: 'decision',
      headerName: 'Decision',
      width: 102,
      filter: 'agTextColumnFilter',
      autoHeight: true,
      valueGetter: (parameters) =>
        rowOf(parameters)
          ?.runs.map((run) => `${run.code} ${run.decision?.replace('-', ' ') ?? run.state.replace('-', ' ')}`)
          .join(', ') ?? '',
      cellRenderer: DecisionCell,
    },
  ]
  const written: Column[] = [
    {
      colId: 'isShortlisted',
      headerName: 'Shortlist',
      width: 98,
      cellDataType: 'boolean',
      cellRenderer: 'agCheckboxCellRenderer',
      cellEditor: 'agCheckboxCellEditor',
      editable: permissions.canShortlist,
      valueGetter: (parameters) => rowOf(parameters)?.isShortlisted ?? false,
    },
    {
      ...numeric,
      colId: 'priority',
      headerName: 'Priority',
      width: 92,
      editable: permissions.canShortlist,
      cellEditor: 'agNumberCellEditor',
      cellEditorParams: { min: 1, max: 9, precision: 0 },
      valueGetter: (parameters) => rowOf(parameters)?.priority ?? null,
      cellRenderer: (parameters: ICellRendererParams<RankingGridRow>) => {
        const value: unknown = parameters.value
        return createElement(PlainNumberCell, { value: typeof value === 'number' ? value : null, decimals: 0 })
      },
    },
    {
      colId: 'remark',
      headerName: 'Remark',
      width: 240,
      filter: 'agTextColumnFilter',
      wrapText: true,
      autoHeight: true,
      editable: permissions.canRemark,
      cellEditor: 'agTextCellEditor',
      cellEditorParams: { maxLength: 500 },
      valueGetter: (parameters) => rowOf(parameters)?.remark ?? '',
    },
  ]
  return { doubts, written }
}

/** Width and sort as a column starts with them: a newer ranking brings new columns and must not undo what the person set. */
function startingWith(column: Column): Column {
  const { width, sort, ...rest } = column
  return {
    ...rest,
    ...(width === undefined ? {} : { initialWidth: width }),
    ...(sort === undefined ? {} : { initialSort: sort }),
  }
}

/** All columns of the ranking, units in the headers. */
export function buildRankingColumns(
  ranking: Ranking,
  permissions: RankingPermissions,
  scale: IntervalScale | null,
  isNarrow: boolean,
): (Column | Group)[] {
  const rates = rateGroups(ranking)
  const judgement = judgementColumns(permissions)
  const columns: (Column | Group)[] = [
    ...rankColumns(isNarrow),
    rates.first,
    slopeGroup(ranking, scale),
    ...judgement.doubts,
    rates.second,
    stateGroup(ranking),
    ...judgement.written,
  ]
  return columns.map((column) =>
    'children' in column
      ? { ...column, children: column.children.map((child) => ('children' in child ? child : startingWith(child))) }
      : startingWith(column),
  )
}

/** Which working a column's number belongs to. */
export function workingKeyOf(colId: string): string {
  if (colId === 'activationEnergyInterval') return 'activationEnergyJPerMol'
  if (colId === 'rankInterval' || colId === 'probabilityBest') return 'rank'
  return colId
}
