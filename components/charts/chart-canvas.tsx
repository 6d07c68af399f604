'use client'

import ReactEChartsCore from 'echarts-for-react/lib/core'
import { CustomChart, LineChart, ScatterChart } from 'echarts/charts'
import {
  GridComponent,
  MarkAreaComponent,
  MarkLineComponent,
  TooltipComponent,
  VisualMapContinuousComponent,
} from 'echarts/components'
import * as echarts from 'echarts/core'
import { LabelLayout } from 'echarts/features'
import { CanvasRenderer } from 'echarts/renderers'
import { useMemo } from 'react'
import { type ChartOption } from './chart-option'
import { type ThemeColours } from './theme-colours'

echarts.use([
  CanvasRenderer,
  CustomChart,
  GridComponent,
  LabelLayout,
  LineChart,
  MarkAreaComponent,
  MarkLineComponent,
  ScatterChart,
  TooltipComponent,
  VisualMapContinuousComponent,
])

/** Lines of the datum under the pointer, put there by the option's builder as `lines`. */
function linesOf(parameters: unknown): string[] {
  const entry = Array.isArray(parameters) ? parameters[0] : parameters
  if (typeof entry !== 'object' || entry === null || !('data' in entry)) return []
  const { data } = entry
  if (typeof data !== 'object' || data === null || !('lines' in data) || !Array.isArray(data.lines)) return []
  return data.lines.filter((line: unknown): line is string => typeof line === 'string')
}

/** Built as elements, never as markup: names of samples and files come from people and instruments. */
function tooltipElement(parameters: unknown): HTMLElement {
  const box = document.createElement('div')
  for (const [index, line] of linesOf(parameters).entries()) {
    const row = document.createElement('div')
    row.className = index === 0 ? 'font-semibold' : ''
    row.textContent = line
    box.append(row)
  }
  return box
}

export interface ChartCanvasProps {
  readonly option: ChartOption
  readonly colours: ThemeColours
  readonly onPick?: (datum: unknown) => void
}

/**
 * The one place that mounts the chart library. It fills its parent and follows its size. Only ever loaded in the browser (chart-frame.tsx):
 * on the server it would write a style attribute, which the content security policy blocks.
 */
export default function ChartCanvas({ option, colours, onPick }: ChartCanvasProps) {
  const whole = useMemo(
    () => ({
      ...option,
      tooltip: {
        trigger: 'item',
        confine: true,
        transitionDuration: 0,
        backgroundColor: colours.sheet,
        borderColor: colours.lineStrong,
        borderWidth: 1,
        padding: [6, 9],
        textStyle: { color: colours.ink, fontFamily: colours.fontFamily, fontSize: 12.5 },
        extraCssText: 'box-shadow: none; border-radius: 4px;',
        ...(typeof option.tooltip === 'object' && !Array.isArray(option.tooltip) ? option.tooltip : {}),
        formatter: tooltipElement,
      },
    }),
    [option, colours],
  )
  const events = useMemo(
    () => ({
      click: (event: unknown) => {
        if (typeof event === 'object' && event !== null && 'data' in event) onPick?.(event.data)
      },
    }),
    [onPick],
  )
  return (
    <ReactEChartsCore
      echarts={echarts}
      option={whole}
      notMerge
      opts={{ renderer: 'canvas' }}
      onEvents={events}
      style={{ width: '100%', height: '100%' }}
    />
  )
}
