'use client'

import exp from '@stdlib/math-base-special-exp'
import { useState } from 'react'
import { compareEstimates, lnOfEstimate, type EstimateDifference } from '@/lib/analysis/ranking/compare-estimates'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { formatFixed } from '@/components/numbers/format-fixed'
import { practicalUnits } from '@/components/numbers/practical-units'
import { SelectField } from '@/components/ui/select-field'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { pText } from './p-text'

interface ComparisonProps {
  readonly ranking: Ranking
  readonly rows: readonly RankingRow[]
}

interface ComparedLine {
  readonly name: string
  readonly unit: string
  readonly found: EstimateDifference | null
  readonly isRatio: boolean
}

/** Differences of two samples, as the table below shows them. */
function comparedLines(ranking: Ranking, first: RankingRow, second: RankingRow): ComparedLine[] {
  const level = ranking.confidenceLevel
  const celsius = formatFixed(ranking.referenceTemperatureK - 273.15, 1).replace('.0', '')
  const ratio = (a: RankingRow['rateMolPerKgS'], b: RankingRow['rateMolPerKgS']) =>
    a && b && a.value > 0 && b.value > 0 ? compareEstimates(lnOfEstimate(a), lnOfEstimate(b), level) : null
  return [
    {
      name: 'Difference of Ea',
      unit: practicalUnits.activationEnergy.label,
      found:
        first.activationEnergyJPerMol && second.activationEnergyJPerMol
          ? compareEstimates(first.activationEnergyJPerMol, second.activationEnergyJPerMol, level)
          : null,
      isRatio: false,
    },
    {
      name: `Ratio of rates at ${celsius} °C`,
      unit: 'per gram',
      found: ratio(first.rateMolPerKgS, second.rateMolPerKgS),
      isRatio: true,
    },
    {
      name: `Ratio of TOF at ${celsius} °C`,
      unit: 'per site',
      found: ratio(first.turnoverFrequencyPerS, second.turnoverFrequencyPerS),
      isRatio: true,
    },
  ]
}

function Line({ line }: { line: ComparedLine }) {
  const { found } = line
  const cell = 'border-b border-line px-2 py-1 text-right whitespace-nowrap'
  return (
    <tr>
      <th scope="row" className="border-b border-line px-2 py-1 text-left font-normal">
        {line.name} <span className="text-[12.5px] text-ink-3">{line.unit}</span>
      </th>
      {found === null ? (
        <td colSpan={3} className="border-b border-line px-2 py-1 text-left text-ink-3">
          cannot be said: one of the two has no such number, or no uncertainty
        </td>
      ) : (
        <>
          <td className={cell}>
            {line.isRatio ? (
              formatFixed(exp(found.difference), 3)
            ) : (
              <ValueWithUncertainty
                value={found.difference / 1_000}
                uncertainty={(found.interval[1] - found.interval[0]) / 2_000}
              />
            )}
          </td>
          <td className={cell}>
            {line.isRatio
              ? `${formatFixed(exp(found.interval[0]), 3)} to ${formatFixed(exp(found.interval[1]), 3)}`
              : `${formatFixed(found.interval[0] / 1_000, 2)} to ${formatFixed(found.interval[1] / 1_000, 2)}`}
          </td>
          <td className={cell}>{pText(found.pValue)}</td>
        </>
      )}
    </tr>
  )
}

/** One plain sentence: which is faster here, or that they cannot be told apart. */
function verdict(ranking: Ranking, first: RankingRow, second: RankingRow, lines: readonly ComparedLine[]): string {
  const ranked = lines[ranking.rankedBy === 'turnover-frequency' ? 2 : 1]?.found ?? null
  const celsius = formatFixed(ranking.referenceTemperatureK - 273.15, 1).replace('.0', '')
  if (ranked === null) return `${first.sampleCode} and ${second.sampleCode} cannot be compared at ${celsius} °C.`
  const percent = Math.round(ranking.confidenceLevel * 100)
  if (ranked.interval[0] <= 0 && ranked.interval[1] >= 0) {
    return `${first.sampleCode} and ${second.sampleCode} cannot be told apart at ${celsius} °C: the ${percent} % interval of their ratio holds 1.`
  }
  const [faster, slower] = ranked.difference > 0 ? [first, second] : [second, first]
  return `${faster.sampleCode} is faster than ${slower.sampleCode} at ${celsius} °C: the ${percent} % interval of their ratio leaves 1 out.`
}

/** Two samples side by side, errors that both share cancelled. */
export function Comparison({ ranking, rows }: ComparisonProps) {
  const [firstId, setFirstId] = useState(rows[0]?.sampleId ?? '')
  const [secondId, setSecondId] = useState(rows[1]?.sampleId ?? '')
  const first = rows.find((row) => row.sampleId === firstId) ?? rows[0]
  const second = rows.find((row) => row.sampleId === secondId) ?? rows[1]
  if (!first || !second) return <p className="text-ink-2">Two samples with a line are needed for a comparison.</p>
  const choices = rows.map((row) => ({ value: row.sampleId, label: `${row.sampleCode} ${row.sampleName}` }))
  const isSame = first.sampleId === second.sampleId
  const lines = isSame ? [] : comparedLines(ranking, first, second)
  const head = 'border-b border-line-strong px-2 py-1 text-right text-[12.5px] font-semibold text-ink-2'
  return (
    <div>
      <div className="grid max-w-2xl gap-3 sm:grid-cols-2">
        <SelectField
          name="first"
          label="Sample"
          choices={choices}
          value={first.sampleId}
          onChange={(event) => setFirstId(event.target.value)}
        />
        <SelectField
          name="second"
          label="against"
          choices={choices}
          value={second.sampleId}
          onChange={(event) => setSecondId(event.target.value)}
        />
      </div>
      {isSame ? (
        <p className="text-ink-2">Choose two different samples.</p>
      ) : (
        <>
          <div
            className="relative mt-3 overflow-x-auto"
            role="region"
            aria-label={`${first.sampleCode} against ${second.sampleCode}`}
            tabIndex={0}
          >
            <table className="border-collapse">
              <caption className="sr-only">
                {first.sampleCode} against {second.sampleCode}
              </caption>
              <thead>
                <tr>
                  <th scope="col" className={`${head} text-left`}>
                    {first.sampleCode} against {second.sampleCode}
                  </th>
                  <th scope="col" className={head}>
                    Value
                  </th>
                  <th scope="col" className={head}>
                    {Math.round(ranking.confidenceLevel * 100)} % interval
                  </th>
                  <th scope="col" className={head}>
                    p
                  </th>
                </tr>
              </thead>
              <tbody>
                {lines.map((line) => (
                  <Line key={line.name} line={line} />
                ))}
              </tbody>
            </table>
          </div>
          <p className="mt-2 mb-0 max-w-prose rounded bg-well px-3 py-2" role="status">
            {verdict(ranking, first, second, lines)}
          </p>
          <p className="mt-1 mb-0 text-[12.5px] text-ink-3">
            One pair, chosen by hand: p is not adjusted for the other pairs. Errors that both samples share have
            cancelled.
          </p>
        </>
      )}
    </div>
  )
}
