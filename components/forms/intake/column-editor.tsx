'use client'

import { type ReactNode, useId, useState } from 'react'
import { flowReferenceChoices } from '@/components/forms/flow-reference-choices'
import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { useMediaQuery } from '@/components/ui/use-media-query'
import { type ColumnMapSpecification, columnMeanings, type MappedColumn } from '@/lib/domain/column-map'
import { type Detection } from '@/lib/domain/intake'
import { referenceFromKey, referenceKey } from '@/lib/domain/run-form'
import { speciesText } from '@/lib/domain/species-text'
import {
  columnNeeds,
  isSpecies,
  meaningLabels,
  meaningsFor,
  readUnit,
  type UnitReading,
  withMeaning,
  withUnit,
} from './column-rules'

const FIRST_ROWS = 5

interface ColumnEditorProps {
  readonly fileName: string
  readonly detection: Detection
  readonly specification: ColumnMapSpecification
  readonly species: readonly string[]
  readonly isDisabled: boolean
  readonly onChange: (specification: ColumnMapSpecification) => void
}

/** The first rows as they stand in the file, and above each column what is made of it. On a phone, one column after the other. */
export function ColumnEditor({ fileName, detection, specification, species, isDisabled, onChange }: ColumnEditorProps) {
  const isNarrow = useMediaQuery('(width < 40rem)')
  const listId = useId()
  const [isLong, setIsLong] = useState(false)
  const rows = isLong ? detection.firstRows : detection.firstRows.slice(0, FIRST_ROWS)
  const change = (next: MappedColumn) =>
    onChange({
      ...specification,
      columns: specification.columns.map((column) => (column.index === next.index ? next : column)),
    })
  const fields = specification.columns.map((column) => ({
    column,
    example: detection.firstRows.slice(0, 3).map((row) => row[column.index] ?? ''),
    ...columnFields({ column, specification, listId, isDisabled, change }),
  }))
  return (
    <div>
      <datalist id={listId}>
        {species.map((formula) => (
          <option key={formula} value={formula} />
        ))}
      </datalist>
      {isNarrow ? (
        <ul className="m-0 list-none border-t border-line p-0">
          {fields.map((field) => (
            <li key={field.column.index} className="border-b border-line">
              <details>
                <summary className="flex min-h-11 cursor-pointer flex-wrap items-center justify-between gap-x-3 py-1.5">
                  <b className="font-semibold break-all">{nameOf(field.column)}</b>
                  <span className={field.column.meaning === 'ignore' ? 'text-ink-3' : 'text-ink-2'}>
                    {saidOf(field.column)}
                    {field.fault === null ? null : <span className="text-fault"> {field.fault}</span>}
                  </span>
                </summary>
                <p className="m-0 text-[13px] text-ink-2">In the file: {field.example.join(' · ')}</p>
                <div className="grid gap-2 pt-1 pb-3">
                  <Labelled label="Meaning">{field.meaning}</Labelled>
                  {field.unit === null ? null : <Labelled label="Unit">{field.unit}</Labelled>}
                  {field.species === null ? null : <Labelled label="Species">{field.species}</Labelled>}
                  {field.state === null ? null : <Labelled label={field.stateLabel}>{field.state}</Labelled>}
                </div>
              </details>
            </li>
          ))}
        </ul>
      ) : (
        <div className="relative overflow-x-auto pb-1" role="region" aria-label={`Columns of ${fileName}`} tabIndex={0}>
          <table className="border-collapse text-[13px]">
            <caption className="sr-only">First rows of {fileName} with what each column means</caption>
            <thead>
              <tr>
                <RowName>In the file</RowName>
                {fields.map(({ column }) => (
                  <th
                    key={column.index}
                    scope="col"
                    className={classNames(
                      'max-w-52 px-1.5 pb-1 text-left align-bottom font-semibold break-words',
                      column.meaning === 'ignore' && 'text-ink-3',
                    )}
                  >
                    {nameOf(column)}
                  </th>
                ))}
              </tr>
              <FieldRow
                name="Meaning"
                cells={fields.map((field) => field.meaning)}
                // wide enough to read what was chosen; a column that is not read needs less
                widths={fields.map(({ column }) => (column.meaning === 'ignore' ? 'min-w-28' : 'min-w-44'))}
              />
              {fields.some((field) => field.unit !== null) ? (
                <FieldRow name="Unit" cells={fields.map((field) => field.unit)} />
              ) : null}
              {fields.some((field) => field.species !== null) ? (
                <FieldRow name="Species" cells={fields.map((field) => field.species)} />
              ) : null}
              {fields.some((field) => field.state !== null) ? (
                <FieldRow name="Counted at, or from" cells={fields.map((field) => field.state)} />
              ) : null}
            </thead>
            <tbody>
              {rows.map((row, position) => (
                <tr key={position} className={classNames('border-b border-line', position === 0 && 'border-t')}>
                  <RowName isPlain>{position + 1}</RowName>
                  {fields.map(({ column }) => (
                    <td
                      key={column.index}
                      title={row[column.index]}
                      className={classNames(
                        'max-w-52 truncate px-1.5 py-1 whitespace-nowrap',
                        column.meaning === 'ignore' && 'text-ink-3',
                      )}
                    >
                      {row[column.index] ?? ''}
                    </td>
                  ))}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
      {isNarrow || detection.firstRows.length <= FIRST_ROWS ? null : (
        <Button kind="quiet" className="px-0!" onClick={() => setIsLong((before) => !before)} aria-expanded={isLong}>
          {isLong ? 'Show fewer rows' : `Show the first ${String(detection.firstRows.length)} rows`}
        </Button>
      )}
    </div>
  )
}

const nameOf = (column: MappedColumn) => (column.header === '' ? `column ${String(column.index + 1)}` : column.header)

function saidOf(column: MappedColumn): string {
  if (column.meaning === 'ignore') return meaningLabels.ignore
  const what = column.meaning === 'flow' ? 'flow' : meaningLabels[column.meaning]
  const species = column.species === null ? '' : ` of ${speciesText(column.species)}`
  return `${what}${species}${column.unit === '' ? '' : `, ${column.unit}`}`
}

interface Fields {
  readonly meaning: ReactNode
  readonly unit: ReactNode | null
  readonly species: ReactNode | null
  readonly state: ReactNode | null
  readonly stateLabel: string
  /** what is wrong with the column, shortly; null when nothing is */
  readonly fault: string | null
}

function columnFields({
  column,
  specification,
  listId,
  isDisabled,
  change,
}: {
  readonly column: MappedColumn
  readonly specification: ColumnMapSpecification
  readonly listId: string
  readonly isDisabled: boolean
  readonly change: (column: MappedColumn) => void
}): Fields {
  const needs = columnNeeds(column, specification.shape)
  const name = nameOf(column)
  const unit = needs.unit ? readUnit(column) : null
  const isSpeciesMissing = needs.species && column.species === null
  return {
    fault: unit?.ok === false ? 'unit?' : isSpeciesMissing ? 'species?' : null,
    stateLabel: needs.pressureKind ? 'Absolute or gauge' : 'Counted at',
    meaning: (
      <select
        className="control"
        aria-label={`Meaning of ${name}`}
        disabled={isDisabled}
        value={column.meaning}
        onChange={(event) => {
          const meaning = columnMeanings.find((one) => one === event.target.value)
          if (meaning !== undefined) change(withMeaning(column, meaning))
        }}
      >
        {meaningsFor(specification.kind, column.meaning).map((meaning) => (
          <option key={meaning} value={meaning}>
            {meaningLabels[meaning]}
          </option>
        ))}
      </select>
    ),
    unit:
      unit === null ? null : (
        <UnitField name={name} column={column} reading={unit} isDisabled={isDisabled} change={change} />
      ),
    species: needs.species ? (
      // a new field when the meaning changes: what was typed belonged to the old one
      <SpeciesField
        key={column.meaning}
        name={name}
        column={column}
        listId={listId}
        isDisabled={isDisabled}
        change={change}
      />
    ) : null,
    state: needs.pressureKind ? (
      <select
        className="control"
        aria-label={`${name}: absolute or gauge`}
        disabled={isDisabled}
        value={column.pressureKind ?? ''}
        onChange={(event) => {
          const { value } = event.target
          change({ ...column, pressureKind: value === 'absolute' || value === 'gauge' ? value : null })
        }}
      >
        <option value="">not said yet</option>
        <option value="absolute">absolute</option>
        <option value="gauge">gauge</option>
      </select>
    ) : needs.flowReference ? (
      <FlowReferenceField name={name} column={column} isDisabled={isDisabled} change={change} />
    ) : null,
  }
}

interface FieldProps {
  readonly name: string
  readonly column: MappedColumn
  readonly isDisabled: boolean
  readonly change: (column: MappedColumn) => void
}

function UnitField({ name, column, reading, isDisabled, change }: FieldProps & { readonly reading: UnitReading }) {
  const id = useId()
  return (
    <>
      <input
        className="control"
        aria-label={`Unit of ${name}`}
        aria-describedby={id}
        aria-invalid={reading.ok ? undefined : true}
        autoComplete="off"
        maxLength={60}
        disabled={isDisabled}
        value={column.unit}
        onChange={(event) => change(withUnit(column, event.target.value))}
      />
      <span id={id} className={classNames('block text-[12.5px] font-normal', reading.ok ? 'text-ink-2' : 'text-fault')}>
        {reading.sentence}
      </span>
    </>
  )
}

function SpeciesField({ name, column, listId, isDisabled, change }: FieldProps & { readonly listId: string }) {
  const id = useId()
  // what is typed on the way to a formula need not be one yet
  const [typed, setTyped] = useState<string | null>(null)
  const text = typed ?? column.species ?? ''
  const sentence = text === '' ? 'Not stated. Write a formula.' : isSpecies(text) ? '' : 'Not a formula.'
  return (
    <>
      <input
        className="control"
        aria-label={`Species of ${name}`}
        aria-describedby={id}
        aria-invalid={sentence === '' ? undefined : true}
        list={listId}
        autoComplete="off"
        maxLength={20}
        disabled={isDisabled}
        value={text}
        onChange={(event) => {
          const next = event.target.value.trim()
          setTyped(isSpecies(next) ? null : next)
          change({ ...column, species: isSpecies(next) ? next : null })
        }}
      />
      <span id={id} className="block text-[12.5px] font-normal text-fault">
        {sentence}
      </span>
    </>
  )
}

function FlowReferenceField({ name, column, isDisabled, change }: FieldProps) {
  const { referenceTemperatureK: temperatureK, referencePressurePa: pressurePa } = column
  const key = temperatureK === null || pressurePa === null ? '' : referenceKey({ temperatureK, pressurePa })
  return (
    <select
      className="control"
      aria-label={`${name}: state at which the volume is counted`}
      disabled={isDisabled}
      value={key}
      onChange={(event) => {
        const reference = referenceFromKey(event.target.value)
        change({
          ...column,
          referenceTemperatureK: reference?.temperatureK ?? null,
          referencePressurePa: reference?.pressurePa ?? null,
        })
      }}
    >
      <option value="">not said yet</option>
      {flowReferenceChoices(key).map((choice) => (
        <option key={choice.value} value={choice.value}>
          {choice.label}
        </option>
      ))}
    </select>
  )
}

function RowName({ isPlain = false, children }: { readonly isPlain?: boolean; readonly children: ReactNode }) {
  return (
    <th
      scope="row"
      className={classNames(
        'sticky left-0 z-10 bg-paper py-1 pr-3 text-left align-top font-normal whitespace-nowrap text-ink-2',
        isPlain && 'text-right',
      )}
    >
      {children}
    </th>
  )
}

function FieldRow({
  name,
  cells,
  widths = [],
}: {
  readonly name: string
  readonly cells: readonly (ReactNode | null)[]
  readonly widths?: readonly string[]
}) {
  return (
    <tr>
      <RowName>{name}</RowName>
      {cells.map((cell, index) => (
        <td key={index} className={classNames('max-w-52 px-1.5 pb-1.5 align-top font-normal', widths[index])}>
          {cell}
        </td>
      ))}
    </tr>
  )
}

/** The fields name themselves with their column; what stands above them is for the eye. */
function Labelled({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  return (
    <div>
      <div aria-hidden="true" className="mb-0.5 text-[14px] text-ink-2">
        {label}
      </div>
      {children}
    </div>
  )
}
