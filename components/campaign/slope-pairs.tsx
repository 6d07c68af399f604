'use client'

import { useMemo } from 'react'
import { compareAllSlopes } from '@/lib/analysis/ranking/compare-all-slopes'
import { type RankingRow } from '@/lib/domain/ranking'
import { DataTable } from '@/components/ui/data-table'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { pText } from './p-text'

/** Doubts under which a slope is not that of one reaction on one unchanged surface. */
const SLOPE_DOUBTS = ['deactivation', 'strong-deactivation', 'pore-diffusion-likely', 'line-bends']

/** What stands against comparing the slopes of two samples: `CQ-107: lost 13 % on stream`. */
export function slopeDoubts(rows: readonly RankingRow[], codes: readonly string[]): string[] {
  return rows
    .filter((row) => codes.includes(row.sampleCode))
    .flatMap((row) =>
      row.cautions
        .filter((caution) => SLOPE_DOUBTS.includes(caution.code))
        .map((caution) => `${row.sampleCode}: ${caution.tag}`),
    )
}

/** Activation energies of all pairs of samples, each difference with its interval and a p that knows of the other pairs. */
export function SlopePairs({ rows, confidenceLevel }: { rows: readonly RankingRow[]; confidenceLevel: number }) {
  const pairs = useMemo(
    () =>
      compareAllSlopes(
        rows.flatMap((row) =>
          row.activationEnergyJPerMol === null
            ? []
            : [{ name: row.sampleCode, activationEnergyJPerMol: row.activationEnergyJPerMol }],
        ),
        confidenceLevel,
      ),
    [rows, confidenceLevel],
  )
  const limit = 1 - confidenceLevel
  return (
    <div className="max-w-4xl">
      <DataTable
        caption="Differences of activation energy, all pairs"
        rows={pairs}
        rowKey={(pair) => `${pair.first} ${pair.second}`}
        empty="Two samples with a line and an interval are needed."
        columns={[
          {
            key: 'pair',
            head: 'Pair',
            isRowHead: true,
            cell: (pair) => `${pair.first} − ${pair.second}`,
          },
          {
            key: 'difference',
            head: 'Difference of Ea',
            unit: 'kJ mol⁻¹',
            isNumber: true,
            cell: (pair) => (
              <ValueWithUncertainty
                value={pair.found.difference / 1_000}
                uncertainty={(pair.found.interval[1] - pair.found.interval[0]) / 2_000}
              />
            ),
          },
          { key: 'p', head: 'p, this pair', isNumber: true, cell: (pair) => pText(pair.found.pValue) },
          { key: 'adjusted', head: 'p, all pairs', isNumber: true, cell: (pair) => pText(pair.adjustedPValue) },
          {
            key: 'verdict',
            head: 'Says',
            cell: (pair) =>
              pair.adjustedPValue === null ? (
                <span className="text-ink-3">nothing</span>
              ) : pair.adjustedPValue < limit ? (
                'slopes differ'
              ) : (
                <span className="text-ink-2">cannot be told apart</span>
              ),
          },
          {
            key: 'doubts',
            head: 'But',
            cell: (pair) => (
              <span className="text-doubt">{slopeDoubts(rows, [pair.first, pair.second]).join('; ')}</span>
            ),
          },
        ]}
      />
      <p className="mt-1 mb-0 text-[12.5px] text-ink-3">
        p of all pairs is adjusted after Holm: one false “differ” in the whole table is less likely than{' '}
        {Math.round(limit * 100)} %. ± is half of the {Math.round(confidenceLevel * 100)} % interval of the pair alone.
        A slope that time on stream, pores or a bend has a part in is not that of the reaction alone: what the test says
        of such a pair is about the lines.
      </p>
    </div>
  )
}
