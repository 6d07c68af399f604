'use client'

import { useState } from 'react'
import { SelectField } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'
import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { type ColumnMapSpecification } from '@/lib/domain/column-map'
import { isTimeZone } from '@/lib/domain/instant-in-zone'
import { typedOrEmpty } from '@/lib/domain/typed-quantity'

interface ReadingSettingsProps {
  readonly specification: ColumnMapSpecification
  readonly onChange: (specification: ColumnMapSpecification) => void
}

/** What holds for the file as a whole: its kind, its clock, its numbers. */
export function ReadingSettings({ specification, onChange }: ReadingSettingsProps) {
  const change = (part: Partial<ColumnMapSpecification>) => onChange({ ...specification, ...part })
  const has = (...meanings: readonly string[]) =>
    specification.columns.some((column) => meanings.includes(column.meaning))
  const hasGauge = specification.columns.some((column) => column.pressureKind === 'gauge')
  return (
    <div className="grid max-w-[56rem] gap-3 sm:grid-cols-2 lg:grid-cols-3">
      <SelectField
        name="kind"
        label="The file is"
        value={specification.kind}
        choices={[
          { value: 'rig-log', label: 'a log of the rig' },
          { value: 'analyser', label: 'results of the analyser' },
          { value: 'attachment', label: 'an attachment, not read' },
        ]}
        onChange={(event) => {
          const { value } = event.target
          if (value === 'rig-log' || value === 'analyser' || value === 'attachment') change({ kind: value })
        }}
      />
      {specification.kind === 'analyser' ? (
        <SelectField
          name="shape"
          label="One row is"
          value={specification.shape}
          choices={[
            { value: 'wide', label: 'an injection, species side by side' },
            { value: 'long', label: 'a peak, its species in a column' },
          ]}
          onChange={(event) => change({ shape: event.target.value === 'long' ? 'long' : 'wide' })}
        />
      ) : null}
      <SelectField
        name="decimalMark"
        label="Decimal mark"
        value={specification.decimalMark}
        choices={[
          { value: '.', label: 'point: 1.25' },
          { value: ',', label: 'comma: 1,25' },
        ]}
        onChange={(event) => change({ decimalMark: event.target.value === ',' ? ',' : '.' })}
      />
      <SelectField
        name="dateOrder"
        label="Order of dates"
        unchosen="as each date tells"
        value={specification.dateOrder ?? ''}
        choices={[
          { value: 'year-first', label: 'year, month, day' },
          { value: 'day-first', label: 'day, month, year' },
          { value: 'month-first', label: 'month, day, year' },
        ]}
        onChange={(event) => {
          const { value } = event.target
          change({
            dateOrder: value === 'year-first' || value === 'day-first' || value === 'month-first' ? value : null,
          })
        }}
      />
      <TimeZoneField specification={specification} onChange={onChange} />
      {has('elapsed-time', 'time-of-day') ? (
        <TextField
          name="elapsedStart"
          label="Start of the clock"
          hint="Empty: as the file says itself."
          maxLength={40}
          value={specification.elapsedStart ?? ''}
          onChange={(event) => change({ elapsedStart: event.target.value === '' ? null : event.target.value })}
        />
      ) : null}
      {hasGauge ? <BarometerField specification={specification} onChange={onChange} /> : null}
      {has('mole-fraction') ? (
        <SelectField
          name="basis"
          label="Fractions are of"
          unchosen="not said yet"
          value={specification.basis ?? ''}
          choices={[
            { value: 'dry', label: 'the dry gas' },
            { value: 'wet', label: 'the wet gas' },
          ]}
          onChange={(event) => {
            const { value } = event.target
            change({ basis: value === 'dry' || value === 'wet' ? value : null })
          }}
        />
      ) : null}
      {has('valve') ? (
        <TextField
          name="bypassWords"
          label="Words for the bypass"
          hint="As in the valve column, commas between them."
          defaultValue={specification.bypassWords.join(', ')}
          onChange={(event) =>
            change({
              bypassWords: event.target.value
                .split(',')
                .map((word) => word.trim().slice(0, 40))
                .filter((word) => word !== '')
                .slice(0, 20),
            })
          }
        />
      ) : null}
    </div>
  )
}

function TimeZoneField({ specification, onChange }: ReadingSettingsProps) {
  const [typed, setTyped] = useState<string | null>(null)
  return (
    <TextField
      name="timeZone"
      label="Zone of the clock"
      placeholder="Europe/Zurich"
      value={typed ?? specification.timeZone}
      error={typed === null ? undefined : 'No such zone. Write it as continent and city: Europe/Zurich.'}
      onChange={(event) => {
        const text = event.target.value.trim()
        const isKnown = text === '' || isTimeZone(text)
        setTyped(isKnown ? null : text)
        if (isKnown) onChange({ ...specification, timeZone: text })
      }}
    />
  )
}

function BarometerField({ specification, onChange }: ReadingSettingsProps) {
  const [typed, setTyped] = useState(typedOrEmpty(specification.barometerPa, 'pressure'))
  const read = typed.trim() === '' ? null : parseQuantity(typed, 'pressure')
  const isUsable = read === null || (read.ok && read.valueSi >= 50_000 && read.valueSi <= 120_000)
  return (
    <TextField
      name="barometer"
      label="Pressure of the room"
      placeholder="1013 mbar"
      value={typed}
      understood={read?.ok === true ? read.said : undefined}
      error={
        isUsable ? undefined : read?.ok === false ? read.sentence : 'The air of a room has between 500 and 1200 mbar.'
      }
      onChange={(event) => {
        const text = event.target.value
        setTyped(text)
        const next = text.trim() === '' ? null : parseQuantity(text, 'pressure')
        if (next === null) onChange({ ...specification, barometerPa: null })
        else if (next.ok && next.valueSi >= 50_000 && next.valueSi <= 120_000)
          onChange({ ...specification, barometerPa: next.valueSi })
      }}
    />
  )
}
