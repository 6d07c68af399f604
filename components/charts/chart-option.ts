import { type CustomSeriesOption, type LineSeriesOption, type ScatterSeriesOption } from 'echarts/charts'
import {
  type GridComponentOption,
  type MarkAreaComponentOption,
  type MarkLineComponentOption,
  type TooltipComponentOption,
  type VisualMapComponentOption,
} from 'echarts/components'
import { type ComposeOption } from 'echarts/core'

/** What the charts of this product may ask of the library: exactly the parts that chart-canvas.tsx brings in. */
export type ChartOption = ComposeOption<
  | LineSeriesOption
  | ScatterSeriesOption
  | CustomSeriesOption
  | GridComponentOption
  | MarkAreaComponentOption
  | MarkLineComponentOption
  | TooltipComponentOption
  | VisualMapComponentOption
>
