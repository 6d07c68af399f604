'use client'

import { useEffect, useMemo, useRef, useState } from 'react'
import { type RunTrace } from '@/lib/domain/run-result'
import { type Hold, type InjectionUse } from '@/lib/analysis/reduction/run-reduction'
import { ChartFrame } from './chart-frame'
import { HoldEdges, type HoldWindow } from './hold-edges'
import { type TemperWindow } from './temper-scale'
import { useThemeColours } from './theme-colours'
import { buildTimeTraceOption, timeTraceSpan } from './time-trace-chart-option'
import { timeTraceSummary, timeTraceTable } from './time-trace-text'

interface TimeTraceChartProps {
  readonly trace: RunTrace
  readonly holds: readonly Hold[]
  readonly injections: readonly InjectionUse[]
  readonly window: TemperWindow
  /** left out where the windows may not be moved */
  readonly onMoveHold?: (window: HoldWindow) => void
  readonly onPickInjection?: (timeS: number) => void
}

const HEIGHT = 236

function injectionTimeOf(datum: unknown): number | null {
  if (typeof datum !== 'object' || datum === null || !('injectionTimeS' in datum)) return null
  return typeof datum.injectionTimeS === 'number' ? datum.injectionTimeS : null
}

/** Bed temperature over time with the holds and what the analyser saw. */
export function TimeTraceChart({ trace, holds, injections, window, onMoveHold, onPickInjection }: TimeTraceChartProps) {
  const host = useRef<HTMLDivElement>(null)
  const [width, setWidth] = useState(0)
  useEffect(() => {
    const element = host.current
    if (!element) return
    const observer = new ResizeObserver(() => setWidth(element.clientWidth))
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  const colours = useThemeColours()
  const isCompact = width > 0 && width < 640
  const option = useMemo(
    () => buildTimeTraceOption({ trace, holds, injections, window, colours, isCompact }),
    [trace, holds, injections, window, colours, isCompact],
  )
  const table = useMemo(() => timeTraceTable(trace, holds, injections), [trace, holds, injections])
  const span = timeTraceSpan(trace)
  return (
    <div ref={host} className="min-w-0">
      <ChartFrame
        label="Bed temperature and conversion over time"
        summary={timeTraceSummary(trace, holds, injections)}
        table={table}
        option={option}
        colours={colours}
        heightClass="h-[236px]"
        onPick={(datum) => {
          const timeS = injectionTimeOf(datum)
          if (timeS !== null) onPickInjection?.(timeS)
        }}
        overlay={
          onMoveHold && width > 0 ? (
            <HoldEdges
              holds={holds}
              startS={span.startS}
              endS={span.endS}
              width={width}
              height={HEIGHT}
              onMove={onMoveHold}
            />
          ) : null
        }
      />
    </div>
  )
}
