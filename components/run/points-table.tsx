'use client'

import { type Estimate } from '@/lib/analysis/estimate'
import { type Caution } from '@/lib/analysis/caution'
import { type Point } from '@/lib/analysis/reduction/run-reduction'
import { temperCssColour, type TemperWindow } from '@/components/charts/temper-scale'
import { formatFixed } from '@/components/numbers/format-fixed'
import { practicalUnits, type PracticalUnit } from '@/components/numbers/practical-units'
import { speciesLabel } from '@/components/numbers/species-label'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { CautionTag } from '@/components/working/caution-tag'

export interface PickedNumber {
  readonly holdNumber: number
  /** key of the point's workings */
  readonly key: string
}

interface PointsTableProps {
  readonly points: readonly Point[]
  readonly window: TemperWindow
  readonly picked: PickedNumber | null
  readonly onPick: (picked: PickedNumber) => void
}

interface NumberColumn {
  readonly key: string
  readonly name: string
  readonly unit: PracticalUnit
  readonly read: (point: Point) => Estimate | null
  /** without an uncertainty of its own: this many decimals */
  readonly decimals: number
  readonly isQuiet?: boolean
}

/** The product that most of the carbon goes to, by the mean over the holds. */
export function mainProduct(points: readonly Point[]): string | null {
  const sums = new Map<string, number>()
  for (const point of points) {
    for (const [species, selectivity] of Object.entries(point.carbonSelectivity)) {
      sums.set(species, (sums.get(species) ?? 0) + selectivity.value)
    }
  }
  return [...sums].sort((a, b) => b[1] - a[1])[0]?.[0] ?? null
}

function numberColumns(product: string | null): NumberColumn[] {
  return [
    { key: 'temperatureK', name: 'T bed', unit: practicalUnits.temperature, read: (p) => p.temperatureK, decimals: 2 },
    {
      key: 'conversionByProducts',
      name: 'X, products',
      unit: practicalUnits.percent,
      read: (p) => p.conversionByProducts,
      decimals: 3,
    },
    {
      key: 'conversionByReactant',
      name: 'X, reactant',
      unit: practicalUnits.percent,
      read: (p) => p.conversionByReactant,
      decimals: 1,
      isQuiet: true,
    },
    ...(product === null
      ? []
      : [
          {
            key: `carbonSelectivity.${product}`,
            name: `${speciesLabel(product)} select.`,
            unit: { ...practicalUnits.percent, label: 'C-mol %' },
            read: (p: Point) => p.carbonSelectivity[product] ?? null,
            decimals: 1,
          },
        ]),
    {
      key: 'carbonBalance',
      name: 'Carbon',
      unit: { ...practicalUnits.ratio, label: 'out/in' },
      read: (p) => p.carbonBalance,
      decimals: 3,
    },
    { key: 'rateMolPerKgS', name: 'Rate', unit: practicalUnits.rate, read: (p) => p.rateMolPerKgS, decimals: 3 },
    {
      key: 'turnoverFrequencyPerS',
      name: 'TOF',
      unit: practicalUnits.turnoverFrequency,
      read: (p) => p.turnoverFrequencyPerS,
      decimals: 1,
    },
  ]
}

/** Key under which a point keeps the working of a column: selectivities may share one. */
export function workingOfPoint(point: Point, key: string) {
  return point.workings[key] ?? point.workings[key.split('.')[0] ?? key] ?? null
}

function Cell({
  column,
  point,
  isPicked,
  onPick,
}: {
  column: NumberColumn
  point: Point
  isPicked: boolean
  onPick: () => void
}) {
  const estimate = column.read(point)
  if (estimate === null) return <span className="text-ink-3">–</span>
  const u = estimate.randomStandardUncertainty
  const content =
    u === null ? (
      <span>
        {formatFixed(column.unit.fromSi(estimate.value), column.decimals)}
        <span className="text-[.84em] text-ink-3"> ± ?</span>
      </span>
    ) : (
      <ValueWithUncertainty value={column.unit.fromSi(estimate.value)} uncertainty={column.unit.differenceFromSi(u)} />
    )
  if (workingOfPoint(point, column.key) === null) return content
  return (
    <button
      type="button"
      onClick={onPick}
      aria-pressed={isPicked}
      aria-label={`${column.name} at hold ${point.hold.number}: ${formatFixed(column.unit.fromSi(estimate.value), column.decimals)} ${column.unit.label}, show working`}
      className="min-h-6 cursor-pointer decoration-ink-3 decoration-dotted underline-offset-4 hover:underline touch:min-h-11"
    >
      {content}
    </button>
  )
}

const isDoubt = (caution: Caution) => caution.severity !== 'note'

/** Notes say the same of many holds: each is written once, with its holds. */
export function notesOfHolds(points: readonly Point[]): { tag: string; sentence: string; holds: number[] }[] {
  const notes = new Map<string, { tag: string; sentence: string; holds: number[] }>()
  for (const point of points) {
    for (const caution of point.cautions.filter((entry) => !isDoubt(entry))) {
      // numbers differ from hold to hold, so notes are told apart by their words; the digit of a formula (CH4) belongs to the word
      const key = `${caution.code} ${caution.tag.replace(/(?<![A-Za-z])[−-]?\d+(\.\d+)?/g, '#')}`
      const note = notes.get(key) ?? { tag: caution.tag, sentence: caution.sentence, holds: [] }
      if (!note.holds.includes(point.hold.number)) note.holds.push(point.hold.number)
      notes.set(key, note)
    }
  }
  return [...notes.values()]
}

/** One row a hold: both conversion routes, rates, and what is doubtful; each number opens its working. */
export function PointsTable({ points, window, picked, onPick }: PointsTableProps) {
  const columns = numberColumns(mainProduct(points))
  const head =
    'border-b border-line-strong px-1.5 py-1 align-bottom text-[12.5px] leading-tight font-semibold text-ink-2'
  return (
    <div className="relative overflow-x-auto" role="region" aria-label="Points" tabIndex={0}>
      <table className="mt-1.5 w-full border-collapse">
        <caption className="sr-only">Points, one row a hold</caption>
        <thead>
          <tr>
            <th scope="col" className={`${head} text-left`}>
              Hold
            </th>
            {columns.slice(0, 1).map((column) => (
              <Head key={column.key} className={head} name={column.name} unit={column.unit.label} />
            ))}
            <Head className={head} name="on stream" unit="h" />
            {columns.slice(1).map((column) => (
              <Head key={column.key} className={head} name={column.name} unit={column.unit.label} />
            ))}
            <Head className={head} name="Injections" unit="" />
            <th scope="col" className={`${head} text-left`}>
              <span className="sr-only">Cautions</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {points.map((point) => {
            const { hold } = point
            const isOut = point.excluded !== null && hold.returnsTo === null
            return (
              <tr key={hold.foundStartS} className={`border-b border-line align-middle ${isOut ? 'text-ink-3' : ''}`}>
                <th scope="row" className="px-1.5 py-1 text-left font-normal whitespace-nowrap">
                  <svg width="10" height="10" aria-hidden="true" className="mr-1.5 inline-block">
                    <rect
                      x=".75"
                      y=".75"
                      width="8.5"
                      height="8.5"
                      rx="2"
                      fill={isOut ? 'var(--paper)' : temperCssColour(point.temperatureK.value, window)}
                      stroke={temperCssColour(point.temperatureK.value, window)}
                      strokeWidth="1.5"
                    />
                  </svg>
                  <button
                    type="button"
                    aria-label={`Pick hold ${hold.number}`}
                    aria-pressed={picked?.holdNumber === hold.number}
                    onClick={() => onPick({ holdNumber: hold.number, key: picked?.key ?? 'rateMolPerKgS' })}
                    className="min-h-6 min-w-6 cursor-pointer text-left hover:underline touch:min-h-11"
                  >
                    {hold.number}
                  </button>
                  {hold.returnsTo === null ? null : <span className="text-ink-3"> returned</span>}
                  {hold.isEdited ? <span className="text-ink-3"> moved</span> : null}
                </th>
                {columns.map((column, index) => {
                  const isPicked = picked?.holdNumber === hold.number && picked.key === column.key
                  return [
                    <td
                      key={column.key}
                      className={`px-1.5 py-1 text-right whitespace-nowrap ${column.isQuiet ? 'text-ink-3' : ''} ${
                        isPicked ? 'bg-accent-wash outline-2 -outline-offset-2 outline-accent' : ''
                      }`}
                    >
                      <Cell
                        column={column}
                        point={point}
                        isPicked={isPicked}
                        onPick={() => onPick({ holdNumber: hold.number, key: column.key })}
                      />
                    </td>,
                    index === 0 ? (
                      <td key="on-stream" className="px-1.5 py-1 text-right">
                        {formatFixed(practicalUnits.hours.fromSi(point.timeOnStreamS), 1)}
                      </td>
                    ) : null,
                  ]
                })}
                <td className="px-1.5 py-1 text-right whitespace-nowrap">
                  {point.injectionsUsed.length} <span className="text-ink-3">of {point.injectionsInHold}</span>
                </td>
                <td className="px-1.5 py-1 text-left">
                  <span className="flex flex-wrap items-center gap-1">
                    {point.cautions.filter(isDoubt).map((caution, index) => (
                      <CautionTag key={`${caution.code}-${index}`} caution={caution} />
                    ))}
                    {point.excluded === null || hold.returnsTo !== null ? null : (
                      <span className="text-[12.5px] text-ink-2">
                        not in the line, {point.excluded.by}: {point.excluded.reason}
                      </span>
                    )}
                  </span>
                </td>
              </tr>
            )
          })}
        </tbody>
      </table>
    </div>
  )
}

function Head({ className, name, unit }: { className: string; name: string; unit: string }) {
  return (
    <th scope="col" className={`${className} text-right whitespace-nowrap`}>
      {name}
      {unit === '' ? null : <span className="block font-normal text-ink-3">{unit}</span>}
    </th>
  )
}
