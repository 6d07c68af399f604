'use client'

import dynamic from 'next/dynamic'
import { type ReactNode, useId } from 'react'
import { type ChartOption } from './chart-option'
import { type ThemeColours } from './theme-colours'

const ChartCanvas = dynamic(() => import('./chart-canvas'), { ssr: false })

export interface ChartTable {
  readonly columns: readonly string[]
  readonly rows: readonly (readonly string[])[]
}

interface ChartFrameProps {
  /** what the picture is, for those who do not see it */
  readonly label: string
  /** what it shows, in one or two sentences */
  readonly summary: string
  /** the same numbers as a table */
  readonly table: ChartTable
  readonly option: ChartOption
  readonly colours: ThemeColours
  /** height as a class, such as `h-[420px]` */
  readonly heightClass: string
  /** words above the plot, such as the axis title */
  readonly caption?: ReactNode
  /** laid over the plot, same box */
  readonly overlay?: ReactNode
  readonly onPick?: (datum: unknown) => void
}

/** A chart with its text summary and its table twin. */
export function ChartFrame(props: ChartFrameProps) {
  const summaryId = useId()
  return (
    <figure className="m-0 min-w-0">
      {props.caption ? <div className="text-[12px] text-ink-2">{props.caption}</div> : null}
      <div className={`relative overflow-hidden ${props.heightClass}`}>
        <div role="img" aria-label={props.label} aria-describedby={summaryId} className="absolute inset-0">
          <ChartCanvas
            option={props.option}
            colours={props.colours}
            {...(props.onPick ? { onPick: props.onPick } : {})}
          />
        </div>
        {props.overlay}
      </div>
      <figcaption className="mt-1 text-[12.5px] text-ink-3">
        <span id={summaryId}>{props.summary}</span>
        <details className="mt-0.5">
          <summary className="inline-block min-h-6 cursor-pointer text-accent">Numbers of this plot as a table</summary>
          <div
            className="relative max-h-80 overflow-auto"
            tabIndex={0}
            role="region"
            aria-label={`${props.label}, as a table`}
          >
            <table className="mt-1 border-collapse text-ink">
              <thead>
                <tr>
                  {props.table.columns.map((column) => (
                    <th
                      key={column}
                      scope="col"
                      className="border-b border-line-strong px-2 py-1 text-right font-semibold whitespace-nowrap text-ink-2 first:text-left"
                    >
                      {column}
                    </th>
                  ))}
                </tr>
              </thead>
              <tbody>
                {props.table.rows.map((row, index) => (
                  <tr key={index}>
                    {row.map((cell, place) => (
                      <td
                        key={place}
                        className="border-b border-line px-2 py-0.5 text-right whitespace-nowrap first:text-left"
                      >
                        {cell}
                      </td>
                    ))}
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
        </details>
      </figcaption>
    </figure>
  )
}
