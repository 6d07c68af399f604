'use client'

import { type KeyboardEvent, type PointerEvent, useRef, useState } from 'react'
import { type Hold } from '@/lib/analysis/reduction/run-reduction'
import { formatFixed } from '@/components/numbers/format-fixed'
import { timeTraceMargins } from './time-trace-chart-option'

/** A hold's window as a person would like to have it. */
export interface HoldWindow {
  readonly foundStartS: number
  readonly number: number
  readonly startS: number
  readonly endS: number
}

interface HoldEdgesProps {
  readonly holds: readonly Hold[]
  readonly startS: number
  readonly endS: number
  readonly width: number
  readonly height: number
  /** called when an edge is let go; the caller asks for the reason */
  readonly onMove: (window: HoldWindow) => void
}

const STEP_S = 30
const LARGE_STEP_S = 300
const SHORTEST_S = 60

interface Moving {
  readonly foundStartS: number
  readonly edge: 'start' | 'end'
  readonly atS: number
}

/** Handles over the time trace, one at each edge of each hold: dragged, or moved with the arrow keys and put down with Enter. */
export function HoldEdges({ holds, startS, endS, width, height, onMove }: HoldEdgesProps) {
  const host = useRef<SVGSVGElement>(null)
  const [moving, setMoving] = useState<Moving | null>(null)
  const plotWidth = Math.max(1, width - timeTraceMargins.left - timeTraceMargins.right)
  const toX = (atS: number) => timeTraceMargins.left + (plotWidth * (atS - startS)) / (endS - startS)
  const toS = (x: number) => startS + ((x - timeTraceMargins.left) / plotWidth) * (endS - startS)
  const top = timeTraceMargins.top
  const bottom = height - timeTraceMargins.bottom
  const reactorHolds = holds.filter((hold) => hold.kind === 'reactor')

  const limited = (hold: Hold, edge: Moving['edge'], atS: number) => {
    const whole = Math.round(atS)
    return edge === 'start'
      ? Math.max(startS, Math.min(hold.endS - SHORTEST_S, whole))
      : Math.max(hold.startS + SHORTEST_S, Math.min(endS, whole))
  }
  const settle = (hold: Hold, edge: Moving['edge'], atS: number) => {
    setMoving(null)
    const window = {
      foundStartS: hold.foundStartS,
      number: hold.number,
      startS: edge === 'start' ? atS : hold.startS,
      endS: edge === 'end' ? atS : hold.endS,
    }
    if (window.startS !== hold.startS || window.endS !== hold.endS) onMove(window)
  }

  return (
    <svg
      ref={host}
      width={width}
      height={height}
      className="pointer-events-none absolute inset-0"
      role="group"
      aria-label="Edges of the holds"
    >
      {reactorHolds.flatMap((hold) =>
        (['start', 'end'] as const).map((edge) => {
          const own = edge === 'start' ? hold.startS : hold.endS
          const isMoving = moving?.foundStartS === hold.foundStartS && moving.edge === edge
          const atS = isMoving && moving ? moving.atS : own
          const x = toX(atS)
          const hours = formatFixed((atS - startS) / 3_600, 3)
          const at = (event: PointerEvent) =>
            limited(hold, edge, toS(event.clientX - (host.current?.getBoundingClientRect().left ?? 0)))
          const onKeyDown = (event: KeyboardEvent) => {
            const size = event.shiftKey ? LARGE_STEP_S : STEP_S
            if (event.key === 'ArrowLeft' || event.key === 'ArrowRight') {
              event.preventDefault()
              const next = limited(hold, edge, atS + (event.key === 'ArrowLeft' ? -size : size))
              setMoving({ foundStartS: hold.foundStartS, edge, atS: next })
            }
            if (event.key === 'Enter' && isMoving) {
              event.preventDefault()
              settle(hold, edge, atS)
            }
            if (event.key === 'Escape') setMoving(null)
          }
          return (
            <g
              key={`${hold.foundStartS}-${edge}`}
              role="slider"
              tabIndex={0}
              aria-label={`${edge === 'start' ? 'Start' : 'End'} of hold ${hold.number}`}
              aria-valuemin={0}
              aria-valuemax={Math.round(((endS - startS) / 3_600) * 1_000) / 1_000}
              aria-valuenow={Math.round(((atS - startS) / 3_600) * 1_000) / 1_000}
              aria-valuetext={`${hours} h${isMoving ? ', press Enter to put it down' : ''}`}
              className="pointer-events-auto cursor-ew-resize touch-none"
              onKeyDown={onKeyDown}
              onBlur={() => setMoving(null)}
              onPointerDown={(event) => {
                event.currentTarget.setPointerCapture(event.pointerId)
                setMoving({ foundStartS: hold.foundStartS, edge, atS: at(event) })
              }}
              onPointerMove={(event) => {
                if (isMoving) setMoving({ foundStartS: hold.foundStartS, edge, atS: at(event) })
              }}
              onPointerUp={(event) => {
                if (isMoving) settle(hold, edge, at(event))
              }}
              onPointerCancel={() => setMoving(null)}
            >
              <rect x={x - 8} y={top} width="16" height={Math.max(1, bottom - top)} fill="transparent" />
              <line
                x1={x}
                x2={x}
                y1={top}
                y2={bottom}
                stroke={isMoving ? 'var(--accent)' : 'var(--line-strong)'}
                strokeWidth={isMoving ? 2 : 1}
                strokeDasharray={isMoving ? undefined : '2 3'}
              />
              {isMoving ? (
                <text
                  x={Math.max(30, Math.min(width - 30, x))}
                  y={bottom - 6}
                  textAnchor="middle"
                  fontSize="12"
                  fontWeight="600"
                  fill="var(--ink)"
                  stroke="var(--paper)"
                  strokeWidth="4"
                  paintOrder="stroke"
                >
                  {hours} h
                </text>
              ) : null}
            </g>
          )
        }),
      )}
    </svg>
  )
}
