'use client'

import { type ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { CheckField } from '@/components/ui/check-field'
import { classNames } from '@/components/ui/class-names'
import { type RunFormValues } from '@/lib/domain/run-form'
import { speciesText } from '@/lib/domain/species-text'

export function Part({
  title,
  aside,
  children,
}: {
  readonly title: string
  readonly aside: ReactNode
  readonly children: ReactNode
}) {
  return (
    <fieldset className="mt-4 min-w-0">
      {title === '' ? (
        <legend className="sr-only">What and where</legend>
      ) : (
        <legend className="flex w-full items-center gap-3 font-head text-[17px] font-[560]">
          {title}
          <span className="h-px flex-1 bg-line" aria-hidden="true" />
        </legend>
      )}
      <div className="mt-2 grid gap-x-10 gap-y-3 lg:grid-cols-[minmax(0,34rem)_minmax(0,30rem)]">
        <div className="grid grid-cols-2 content-start gap-x-3 gap-y-2.5">{children}</div>
        <div className="grid content-start gap-2.5">{aside}</div>
      </div>
    </fieldset>
  )
}

export function Said({ children }: { readonly children: ReactNode }) {
  return <p className="text-[13px] text-ink-2">{children}</p>
}

export function Radio({
  name,
  value,
  label,
  isChecked,
  onChoose,
}: {
  readonly name: string
  readonly value: string
  readonly label: string
  readonly isChecked: boolean
  readonly onChoose: () => void
}) {
  return (
    <label className="flex min-h-8 items-center gap-2.5 touch:min-h-11">
      <input
        type="radio"
        name={name}
        value={value}
        checked={isChecked}
        onChange={onChoose}
        className="size-[18px] shrink-0 accent-(--accent) touch:size-6"
      />
      {label}
    </label>
  )
}

type FeedRowValues = RunFormValues['feed'][number]

export function FeedRow({
  position,
  row,
  moleFraction,
  speciesIssue,
  flowIssue,
  said,
  onChange,
  onTouch,
  onRemove,
}: {
  readonly position: number
  readonly row: FeedRowValues
  readonly moleFraction: number | null
  readonly speciesIssue: string | undefined
  readonly flowIssue: string | undefined
  readonly said: string | undefined
  readonly onChange: (part: Partial<FeedRowValues>) => void
  readonly onTouch: (name: 'species' | 'flow') => void
  readonly onRemove: () => void
}) {
  const number = String(position + 1)
  const gas = row.species.trim() === '' ? `gas ${number}` : speciesText(row.species.trim())
  const note = `feed-${number}-note`
  return (
    <div className="grid grid-cols-[4.5rem_minmax(0,1fr)_auto] items-center gap-x-2.5 gap-y-0.5 sm:grid-cols-[5rem_minmax(0,1fr)_7rem_auto]">
      <input
        name={`feed.${String(position)}.species`}
        aria-label={`Gas ${number}, formula`}
        value={row.species}
        list="gases"
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
        placeholder="CO2"
        className="control"
        aria-invalid={speciesIssue === undefined ? undefined : true}
        aria-describedby={note}
        onChange={(event) => onChange({ species: event.target.value })}
        onBlur={() => onTouch('species')}
      />
      <input
        name={`feed.${String(position)}.flow`}
        aria-label={`Flow of ${gas}`}
        value={row.flow}
        autoComplete="off"
        placeholder="7.2 mL/min"
        className="control"
        aria-invalid={flowIssue === undefined ? undefined : true}
        aria-describedby={note}
        onChange={(event) => onChange({ flow: event.target.value })}
        onBlur={() => onTouch('flow')}
      />
      <div className="hidden text-[13px] text-ink-2 sm:block">{share(moleFraction, row.isStandard)}</div>
      <Button kind="quiet" className="px-1 touch:px-1" onClick={onRemove} aria-label={`Take ${gas} out`}>
        Take out
      </Button>
      <div id={note} className="col-span-full text-[13px] text-ink-2">
        <span className="sm:hidden">{share(moleFraction, row.isStandard)} </span>
        {said === undefined ? null : <span className={classNames('max-sm:hidden')}>{said}</span>}
        {speciesIssue === undefined ? null : <span className="block text-fault">{speciesIssue}</span>}
        {flowIssue === undefined ? null : <span className="block text-fault">{flowIssue}</span>}
      </div>
      <CheckField
        className="col-span-full"
        label={`${gas === `gas ${number}` ? 'This gas' : gas} is the internal standard`}
        checked={row.isStandard}
        onChange={(event) => onChange({ isStandard: event.target.checked })}
      />
    </div>
  )
}

function share(moleFraction: number | null, isStandard: boolean): string {
  const standard = isStandard ? 'standard' : ''
  if (moleFraction === null) return standard
  const percent = 100 * moleFraction
  return `${percent >= 10 ? percent.toFixed(1) : percent.toPrecision(2)} %${isStandard ? `, ${standard}` : ''}`
}
