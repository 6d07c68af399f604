'use client'

import { useEffect, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { type Working } from '@/lib/analysis/working'
import { Formula } from './formula'
import { withSourceWords } from './source-words'
import { symbolUncertainty, symbolValue, workingText } from './working-text'

interface WorkingPanelProps {
  readonly working: Working
  /** where this number goes on to, in words */
  readonly usedBy?: readonly string[]
  readonly onClose?: () => void
  /** set when a click opened it: the heading then takes the focus */
  readonly takesFocus?: boolean
}

function Lines({ title, lines }: { title: string; lines: readonly string[] }) {
  if (lines.length === 0) return null
  return (
    <>
      <dt className="mt-2.5 text-[12.5px] text-ink-3">{title}</dt>
      {lines.map((line, index) => (
        <dd key={index} className="m-0 mt-px">
          {withSourceWords(line)}
        </dd>
      ))}
    </>
  )
}

/** The derivation of one number: formula, what was put in, the result, why, from what, and where the formula stands. */
export function WorkingPanel({ working, usedBy = [], onClose, takesFocus = false }: WorkingPanelProps) {
  const heading = useRef<HTMLHeadingElement>(null)
  const [copied, setCopied] = useState('')
  useEffect(() => {
    if (takesFocus) heading.current?.focus()
  }, [takesFocus, working])
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(workingText(working))
      setCopied('Copied')
    } catch (error) {
      setCopied(error instanceof Error ? `The browser refused: ${error.message}` : 'The browser refused to copy')
    }
  }
  const resultUncertainty = symbolUncertainty(working.result)
  return (
    <section
      aria-label={`Working: ${working.title}`}
      onKeyDown={(event) => {
        if (event.key === 'Escape') onClose?.()
      }}
    >
      <h2 ref={heading} tabIndex={-1} className="outline-none">
        Working: {working.title.slice(0, 1).toLowerCase() + working.title.slice(1)}
      </h2>
      <p className="m-0 pt-2.5 pb-1 font-head text-[18px] break-words">
        <Formula text={working.formula} />
      </p>
      {working.assumptions.map((line, index) => (
        <p key={index} className="m-0 text-[12.5px] text-ink-3">
          {line}
        </p>
      ))}
      <table className="mt-1 w-full border-collapse">
        <caption className="sr-only">What was put in</caption>
        <tbody>
          {working.symbols.map((symbol, index) => (
            <tr key={index} className="align-baseline">
              <th scope="row" className="pr-3 text-left font-head font-normal italic">
                <Formula text={symbol.symbol} />
              </th>
              <td className="py-px">
                {symbolValue(symbol)}{' '}
                <span className="text-ink-2">
                  <Formula text={symbol.meaning} />
                </span>
              </td>
              <td className="pl-3 text-right text-[12.5px] whitespace-nowrap text-ink-3">
                {symbolUncertainty(symbol)}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <dl className="m-0">
        <dt className="mt-2.5 text-[12.5px] text-ink-3">Result</dt>
        <dd className="m-0 mt-px">
          <b className="font-semibold">{symbolValue(working.result)}</b>{' '}
          <span className="text-[.84em] text-ink-3">{resultUncertainty}</span>
        </dd>
        <Lines title="Why" lines={working.notes} />
        <Lines title="From" lines={working.from} />
        <Lines title="Left out" lines={working.leftOut} />
        <Lines title="Formula" lines={[working.source]} />
        <Lines title="Used by" lines={usedBy} />
      </dl>
      <p className="mt-3 mb-0 flex flex-wrap items-center gap-2">
        <Button onClick={() => void copy()}>Copy as text</Button>
        {onClose ? <Button onClick={onClose}>Close</Button> : null}
        <span role="status" className="text-[12.5px] text-ink-3">
          {copied}
        </span>
      </p>
    </section>
  )
}
