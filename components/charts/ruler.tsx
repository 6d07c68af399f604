'use client'

import { type KeyboardEvent, type PointerEvent, useEffect, useId, useMemo, useRef, useState } from 'react'
import { formatFixed } from '@/components/numbers/format-fixed'
import { rulerScale } from './ruler-scale'
import { type TemperWindow } from './temper-scale'

interface RulerProps {
  readonly window: TemperWindow
  /** every hold of every run shown */
  readonly holdTemperaturesK: readonly number[]
  readonly referenceTemperatureK: number
  /** left out where the reference cannot be moved */
  readonly onReferenceChange?: (temperatureK: number) => void
  /** shown as a hollow handle when it differs from the reference in use */
  readonly methodReferenceTemperatureK?: number
}

const HEIGHT = 62
const INSET = 12
const BAR_TOP = 24
const BAR_HEIGHT = 7
const FALLBACK_WIDTH = 1_000

/** Reference temperatures are whole degrees Celsius: nobody states a rate at 249.7 °C. */
const snapped = (temperatureK: number) => Math.round(temperatureK - 273.15) + 273.15

/** Holds within a pixel or so are spread sideways, so that seven samples at one set-point are seven ticks. */
function tickPlaces(temperaturesK: readonly number[], toX: (temperatureK: number) => number): number[] {
  const places = temperaturesK.map(toX).sort((a, b) => a - b)
  const groups: number[][] = []
  for (const place of places) {
    const last = groups[groups.length - 1]
    if (last && place - (last[0] ?? place) < 4) last.push(place)
    else groups.push([place])
  }
  return groups.flatMap((group) => {
    const middle = group.reduce((sum, place) => sum + place, 0) / group.length
    // many replicates at one set-point become a block rather than spill into the next one
    const gap = Math.min(1.6, 14 / group.length)
    return group.map((_, index) => middle + (index - (group.length - 1) / 2) * gap)
  })
}

/** The campaign's temperature window on a 1/T scale: every hold a tick, the reference temperature a handle. */
export function Ruler(props: RulerProps) {
  const host = useRef<HTMLDivElement>(null)
  const gradientId = useId()
  const [width, setWidth] = useState(FALLBACK_WIDTH)
  const [dragged, setDragged] = useState<number | null>(null)
  useEffect(() => {
    const element = host.current
    if (!element) return
    const observer = new ResizeObserver(() => setWidth(Math.max(240, element.clientWidth)))
    observer.observe(element)
    return () => observer.disconnect()
  }, [])

  const scale = useMemo(() => rulerScale(props.window, width, INSET), [props.window, width])
  const ticks = useMemo(() => tickPlaces(props.holdTemperaturesK, scale.toX), [props.holdTemperaturesK, scale])
  const lowest = Math.ceil(props.window.lowK - 273.15) + 273.15
  const highest = Math.floor(props.window.highK - 273.15) + 273.15
  const within = (temperatureK: number) => Math.max(lowest, Math.min(highest, snapped(temperatureK)))
  const shown = dragged ?? props.referenceTemperatureK
  const handleX = scale.toX(Math.max(props.window.lowK, Math.min(props.window.highK, shown)))
  const canMove = props.onReferenceChange !== undefined

  const temperatureAt = (event: PointerEvent) => {
    const box = host.current?.getBoundingClientRect()
    return within(scale.toTemperatureK(event.clientX - (box?.left ?? 0)))
  }
  const onKeyDown = (event: KeyboardEvent) => {
    const steps: Record<string, number> = {
      ArrowRight: 1,
      ArrowUp: 1,
      ArrowLeft: -1,
      ArrowDown: -1,
      PageUp: 5,
      PageDown: -5,
    }
    const step = steps[event.key]
    const target =
      event.key === 'Home' ? lowest : event.key === 'End' ? highest : step === undefined ? null : within(shown + step)
    if (target === null) return
    event.preventDefault()
    props.onReferenceChange?.(target)
  }
  const celsius = formatFixed(shown - 273.15, Number.isInteger(Math.round((shown - 273.15) * 100) / 100) ? 0 : 2)
  const stops = [0, 1, 2, 3, 4, 5].map((index) => {
    const temperatureK = props.window.lowK + ((props.window.highK - props.window.lowK) * index) / 5
    return { index, offset: (scale.toX(temperatureK) - INSET) / (width - 2 * INSET) }
  })
  return (
    <div ref={host} className="w-full min-w-0 overflow-hidden print:break-inside-avoid">
      <svg width={width} height={HEIGHT} className="block">
        <defs>
          <linearGradient id={gradientId} gradientUnits="userSpaceOnUse" x1={INSET} x2={width - INSET} y1="0" y2="0">
            {stops.map((stop) => (
              <stop key={stop.index} offset={stop.offset} stopColor={`var(--temper-${stop.index})`} />
            ))}
          </linearGradient>
        </defs>
        <g aria-hidden="true">
          <rect x={INSET} y={BAR_TOP} width={width - 2 * INSET} height={BAR_HEIGHT} fill={`url(#${gradientId})`} />
          {scale.celsiusTicks.map((tick) => (
            <line
              key={tick.x}
              x1={tick.x}
              x2={tick.x}
              y1={BAR_TOP + BAR_HEIGHT}
              y2={BAR_TOP + BAR_HEIGHT + (tick.isMajor ? 7 : 4)}
              stroke="var(--line-strong)"
            />
          ))}
          {scale.celsiusTicks
            .filter((tick) => tick.isMajor)
            .map((tick, index) => (
              <text
                key={tick.x}
                x={Math.max(18, Math.min(width - 18, tick.x))}
                y="51"
                textAnchor="middle"
                fontSize="12"
                fill="var(--ink-2)"
              >
                {index === 0 ? `${tick.label} °C` : tick.label}
              </text>
            ))}
          {scale.inverseTicks
            .filter((tick) => tick.x > 24 && tick.x < width - 24)
            .map((tick, index) => (
              <text key={tick.x} x={tick.x} y="11" textAnchor="middle" fontSize="11" fill="var(--ink-3)">
                {index === 0 && tick.x > 60 ? `${tick.label} = 1000 K/T` : tick.label}
              </text>
            ))}
          {ticks.map((place, index) => (
            <line key={index} x1={place} x2={place} y1="17" y2={BAR_TOP} stroke="var(--ink-2)" strokeWidth="1" />
          ))}
        </g>
        <g
          role="slider"
          tabIndex={canMove ? 0 : -1}
          aria-label="Reference temperature of the ranking"
          aria-valuemin={Math.round(lowest - 273.15)}
          aria-valuemax={Math.round(highest - 273.15)}
          aria-valuenow={Math.round((shown - 273.15) * 100) / 100}
          aria-valuetext={`${celsius} °C`}
          aria-disabled={!canMove}
          aria-orientation="horizontal"
          className={canMove ? 'cursor-ew-resize touch-none' : ''}
          onKeyDown={canMove ? onKeyDown : undefined}
          onPointerDown={
            canMove
              ? (event) => {
                  event.currentTarget.setPointerCapture(event.pointerId)
                  setDragged(temperatureAt(event))
                }
              : undefined
          }
          onPointerMove={dragged === null ? undefined : (event) => setDragged(temperatureAt(event))}
          onPointerUp={
            dragged === null
              ? undefined
              : (event) => {
                  const target = temperatureAt(event)
                  setDragged(null)
                  props.onReferenceChange?.(target)
                }
          }
          onPointerCancel={() => setDragged(null)}
        >
          <rect x={handleX - 14} y="8" width="28" height="34" fill="transparent" />
          <line x1={handleX} x2={handleX} y1="15" y2="33" stroke="var(--ink)" strokeWidth="2" />
          <rect
            x={handleX - 3.5}
            y={BAR_TOP}
            width="7"
            height="7"
            fill="var(--paper)"
            stroke="var(--ink)"
            strokeWidth="1.6"
          />
          {dragged === null ? null : (
            <text
              x={Math.max(26, Math.min(width - 26, handleX))}
              y="12"
              textAnchor="middle"
              fontSize="12"
              fontWeight="600"
              fill="var(--ink)"
              stroke="var(--paper)"
              strokeWidth="4"
              paintOrder="stroke"
            >
              {celsius} °C
            </text>
          )}
        </g>
      </svg>
    </div>
  )
}
