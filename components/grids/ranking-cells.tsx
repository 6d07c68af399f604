'use client'

import { type CustomCellRendererProps, type CustomInnerHeaderProps } from 'ag-grid-react'
import { SampleSymbolMark } from '@/components/charts/sample-symbol-mark'
import { temperCssColour, type TemperWindow } from '@/components/charts/temper-scale'
import { formatFixed } from '@/components/numbers/format-fixed'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { CautionTag } from '@/components/working/caution-tag'
import { type Ranking } from '@/lib/domain/ranking'
import { type IntervalScale } from './interval-scale'
import { type RankingGridRow } from './ranking-grid-row'

/** What the cells need beside their row. */
export interface RankingCellContext {
  readonly ranking: Ranking
  readonly rankedCount: number
  readonly scale: IntervalScale | null
  readonly window: TemperWindow
  readonly canDecide: boolean
  readonly runHref: (runId: string) => string
}
type CellProps = CustomCellRendererProps<RankingGridRow, unknown, RankingCellContext>

const dash = <span className="text-ink-3">–</span>

interface QuantityCellProps {
  readonly value: number | null
  readonly half: number | null
  /** why the value or its uncertainty is missing */
  readonly why?: string
  /** a blank is not asked for its numbers */
  readonly isBlank?: boolean
}

/** Value large, uncertainty small; where one of them is missing the cell says so, and why to a pointer, a screen reader and on a click. */
export function QuantityCell({ value, half, why = '', isBlank = false }: QuantityCellProps) {
  if (value === null || !Number.isFinite(value)) {
    if (isBlank || why === '') return dash
    return (
      <span className="text-[12.5px] text-ink-3" title={why}>
        cannot tell<span className="sr-only">: {why}</span>
      </span>
    )
  }
  return (
    <>
      <ValueWithUncertainty value={value} uncertainty={half} />
      {half === null ? (
        <span className="text-[.84em] text-ink-2" title={why}>
          {' '}
          ± ?<span className="sr-only">, the uncertainty cannot be told{why === '' ? '' : `: ${why}`}</span>
        </span>
      ) : null}
      {half === 0 ? <span className="text-[.84em] text-ink-2"> ± 0</span> : null}
    </>
  )
}

/** A count or a place: exact, without an uncertainty. */
export function PlainNumberCell({ value, decimals }: { value: number | null; decimals: number }) {
  return value === null || !Number.isFinite(value) ? dash : <span>{formatFixed(value, decimals)}</span>
}

/** Dots for the possible ranks, a bar over nine draws of ten, a large dot at the rank itself. */
export function RankIntervalCell({ data, context }: CellProps) {
  if (!data?.row.rankInterval || data.row.rank === null) return dash
  const [low, high] = data.row.rankInterval
  const count = Math.max(1, context.rankedCount)
  const gap = Math.min(10.5, 84 / count)
  const x = (rank: number) => 6 + (rank - 1) * gap
  return (
    <svg
      width={Math.max(20, x(count) + 6)}
      height="18"
      role="img"
      aria-label={low === high ? `rank ${low} in 90 % of draws` : `ranks ${low} to ${high} in 90 % of draws`}
      className="inline-block"
    >
      {Array.from({ length: count }, (_, index) => (
        <circle key={index} cx={x(index + 1)} cy="9" r="1.4" fill="var(--line-strong)" />
      ))}
      <line x1={x(low)} x2={x(high)} y1="9" y2="9" stroke="var(--accent)" strokeWidth="3" strokeLinecap="round" />
      <circle cx={x(data.row.rank)} cy="9" r="4" fill="var(--accent)" />
    </svg>
  )
}

/** Shape, code and name. */
export function SampleCell({ data }: CellProps) {
  if (!data) return null
  const { row } = data
  return (
    <span className="block min-w-0 py-1 text-left leading-[19px]">
      <span className="flex flex-wrap items-center gap-x-1.5">
        {row.kind === 'catalyst' ? <SampleSymbolMark symbol={data.symbol} /> : null}
        <span className="font-semibold">{row.sampleCode}</span>
        {row.isProvisional ? (
          <span className="rounded-[3px] bg-well px-1 text-[12.5px] text-ink-2">provisional</span>
        ) : null}
      </span>
      <span className="block text-[12.5px] leading-[16px] whitespace-normal text-ink-3">{row.sampleName}</span>
    </span>
  )
}

/** The interval on the scale of the column. */
export function IntervalCell({ data, context }: CellProps) {
  const interval = data?.row.activationEnergyInterval
  const value = data?.row.activationEnergyJPerMol?.value
  const { scale } = context
  if (!scale || value === undefined) return dash
  const low = interval ? interval[0] / 1_000 : null
  const high = interval ? interval[1] / 1_000 : null
  return (
    <svg
      width={scale.width}
      height="24"
      role="img"
      aria-label={
        low === null || high === null ? 'no interval' : `${formatFixed(low, 1)} to ${formatFixed(high, 1)} kJ per mol`
      }
      className="inline-block align-middle"
    >
      {scale.ticks.map((tick) => (
        <line key={tick} x1={scale.toX(tick)} x2={scale.toX(tick)} y1="0" y2="24" stroke="var(--line)" />
      ))}
      {low === null || high === null ? null : (
        <line x1={scale.toX(low)} x2={scale.toX(high)} y1="12" y2="12" stroke="var(--ink)" strokeWidth="1.6" />
      )}
      <circle
        cx={scale.toX(value / 1_000)}
        cy="12"
        r="3.2"
        fill={low === null ? 'var(--paper)' : 'var(--ink)'}
        stroke="var(--ink)"
      />
    </svg>
  )
}

/** Cautions in words; every one of them is there, the row grows. */
export function CautionsCell({ data }: CellProps) {
  if (!data) return null
  if (data.row.cautions.length === 0) return <span className="text-ink-3">none</span>
  return (
    <span className="flex flex-col items-start gap-0.5 py-1 leading-[19px]">
      {data.row.cautions.map((caution, index) => (
        <CautionTag key={`${caution.code}-${index}`} caution={caution} />
      ))}
    </span>
  )
}

const decisionTones = {
  counts: 'bg-sound-wash text-sound',
  repeat: 'bg-doubt-wash text-doubt',
  'set-aside': 'bg-well text-ink-2',
} as const

/** What was decided on the sample's runs, and where a decision is still to be taken. */
export function DecisionCell({ data, context }: CellProps) {
  if (!data) return null
  const { runs } = data.row
  return (
    <span className="flex flex-col items-start gap-0.5 py-1 leading-[19px]">
      {runs.map((run) => {
        const name = runs.length > 1 ? `${run.code} ` : ''
        if (run.decision) {
          return (
            <a
              key={run.runId}
              href={context.runHref(run.runId)}
              title={run.reason === '' ? `${run.code}` : `${run.code}: ${run.reason}`}
              className={`rounded-[3px] px-1.5 text-[12.5px] no-underline ${decisionTones[run.decision]}`}
            >
              {name}
              {run.decision.replace('-', ' ')}
            </a>
          )
        }
        return (
          <a key={run.runId} href={context.runHref(run.runId)} className="text-[12.5px] text-accent">
            {name}
            {run.state === 'handed-in' ? (context.canDecide ? 'decide…' : 'undecided') : 'open'}
          </a>
        )
      })}
    </span>
  )
}

/** Lowest to highest temperature in its temper colours. */
export function SpanCell({ data, context }: CellProps) {
  if (!data || data.row.lowestTemperatureK === null || data.row.highestTemperatureK === null) return dash
  const ends = [data.row.lowestTemperatureK, data.row.highestTemperatureK]
  return (
    <span className="whitespace-nowrap">
      {ends.map((temperatureK, index) => (
        <span key={index}>
          {index === 1 ? ' to ' : ''}
          <svg width="9" height="9" aria-hidden="true" className="mr-1 inline-block">
            <rect width="9" height="9" rx="2" fill={temperCssColour(temperatureK, context.window)} />
          </svg>
          {formatFixed(temperatureK - 273.15, 0)}
        </span>
      ))}
    </span>
  )
}

interface HeaderParameters extends CustomInnerHeaderProps<RankingGridRow> {
  readonly unit?: string
  readonly scale?: IntervalScale | null
}

/** Room that a tick's number takes [px]. */
const TICK_ROOM = 24

/** Name over unit, or over the ticks of the column's scale. */
export function ColumnHeader({ displayName, unit = '', scale = null }: HeaderParameters) {
  const [first, second] = scale?.ticks ?? []
  const gap = scale && first !== undefined && second !== undefined ? scale.toX(second) - scale.toX(first) : Infinity
  // every line of the scale is drawn in the cells; of the numbers only as many as have room
  const every = Math.max(1, Math.ceil(TICK_ROOM / gap))
  return (
    <span className="block min-w-0 leading-[1.25]">
      <span className="block">{displayName}</span>
      {scale ? (
        <svg width={scale.width} height="13" aria-hidden="true" className="block">
          {scale.ticks
            .filter((_, index) => index % every === 0)
            .map((tick) => (
              <text
                key={tick}
                x={Math.max(8, Math.min(scale.width - 10, scale.toX(tick)))}
                y="10"
                textAnchor="middle"
                fontSize="11"
                fill="var(--ink-3)"
              >
                {Number(tick.toPrecision(4))}
              </text>
            ))}
        </svg>
      ) : null}
      {unit === '' ? null : <span className="block font-normal text-ink-3">{unit}</span>}
    </span>
  )
}
