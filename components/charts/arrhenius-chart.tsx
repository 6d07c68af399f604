'use client'

import { useMemo } from 'react'
import { useMediaQuery } from '@/components/ui/use-media-query'
import { buildArrheniusOption, type ArrheniusSeries } from './arrhenius-chart-option'
import { arrheniusSummary, arrheniusTable } from './arrhenius-text'
import { ChartFrame } from './chart-frame'
import { type TemperWindow } from './temper-scale'
import { useThemeColours } from './theme-colours'

interface ArrheniusChartProps {
  readonly series: readonly ArrheniusSeries[]
  readonly window: TemperWindow
  readonly quantity: 'rate' | 'turnover-frequency'
  readonly isCompact?: boolean
  readonly referenceTemperatureK?: number | null
}

const titles = {
  rate: 'ln (rate / µmol g⁻¹ s⁻¹)',
  'turnover-frequency': 'ln (TOF / s⁻¹)',
} as const

/** ln of a rate against 1000 K/T for the chosen samples, with lines, bands and residuals. */
export function ArrheniusChart({
  series,
  window,
  quantity,
  isCompact = false,
  referenceTemperatureK = null,
}: ArrheniusChartProps) {
  const colours = useThemeColours()
  const isNarrow = useMediaQuery('(max-width: 640px)')
  const hasFewTicks = isCompact || isNarrow
  const option = useMemo(
    () => buildArrheniusOption({ series, window, colours, isCompact: hasFewTicks, referenceTemperatureK }),
    [series, window, colours, hasFewTicks, referenceTemperatureK],
  )
  const table = useMemo(() => arrheniusTable(series, titles[quantity]), [series, quantity])
  return (
    <ChartFrame
      label={`Arrhenius plot of ${[...new Set(series.map((entry) => entry.code))].join(', ') || 'no sample'}`}
      summary={arrheniusSummary(series)}
      table={table}
      option={option}
      colours={colours}
      heightClass={hasFewTicks ? 'h-[410px]' : 'h-[560px]'}
      caption={titles[quantity]}
    />
  )
}
