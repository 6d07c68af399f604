'use client'

import { useMemo } from 'react'
import { compareAllSlopes } from '@/lib/analysis/ranking/compare-all-slopes'
import { type RankingRow } from '@/lib/domain/ranking'
import { DataTable } from '@/components/ui/data-table'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { pText } from './p-text'

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
    <div className="max-w-2xl">
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
        ]}
      />
      <p className="mt-1 mb-0 text-[12.5px] text-ink-3">
        p of all pairs is adjusted after Holm: one false “differ” in the whole table is less likely than{' '}
        {Math.round(limit * 100)} %. ± is half of the {Math.round(confidenceLevel * 100)} % interval of the pair alone.
      </p>
    </div>
  )
}
