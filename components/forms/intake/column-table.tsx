'use client'

import { referenceKey } from '@/lib/domain/run-form'
import { flowReferenceChoices } from '../flow-reference-choices'
import { unitFromAlias } from '@/lib/analysis/units/unit-from-alias'
import { type Dimension } from '@/lib/analysis/units/dimension'
import {
  columnMeanings,
  type ColumnMapSpecification,
  type ColumnMeaning,
  type MappedColumn,
} from '@/lib/domain/column-map'
import { type Detection } from '@/lib/domain/intake'

const WORDS: Readonly<Record<ColumnMeaning, string>> = {
  ignore: 'not used',
  time: 'date and time',
  date: 'date',
  'time-of-day': 'time of day',
  'elapsed-time': 'elapsed time',
  'set-temperature': 'set temperature',
  'bed-temperature': 'bed temperature',
  'wall-temperature': 'wall temperature',
  'inlet-pressure': 'pressure before the bed',
  'outlet-pressure': 'pressure after the bed',
  flow: 'flow of a gas',
  valve: 'valve: bypass or reactor',
  'injection-number': 'number of the injection',
  'species-name': 'name of the species',
  area: 'peak area',
  'mole-fraction': 'mole fraction',
  'retention-time': 'retention time',
  height: 'peak height',
  text: 'text to keep',
}

const DIMENSIONS: Partial<Record<ColumnMeaning, readonly Dimension[]>> = {
  'elapsed-time': ['time'],
  'set-temperature': ['temperature'],
  'bed-temperature': ['temperature'],
  'wall-temperature': ['temperature'],
  'inlet-pressure': ['pressure'],
  'outlet-pressure': ['pressure'],
  flow: ['volume-flow', 'molar-flow'],
  'mole-fraction': ['fraction'],
}

const needsSpecies = (column: MappedColumn, shape: ColumnMapSpecification['shape']) =>
  column.meaning === 'flow' || (shape === 'wide' && (column.meaning === 'area' || column.meaning === 'mole-fraction'))

function UnitLine({ column }: { readonly column: MappedColumn }) {
  const dimensions = DIMENSIONS[column.meaning]
  if (dimensions === undefined) return null
  const known = dimensions.map((dimension) => unitFromAlias(column.unit, dimension)).find((unit) => unit !== null)
  return (
    <span className={known ? 'text-ink-2' : 'text-fault'}>
      {known
        ? `read as ${known.label}`
        : column.unit === ''
          ? 'no unit: write one'
          : `“${column.unit}” is no unit of ${dimensions.join(' or ').replaceAll('-', ' ')}`}
    </span>
  )
}

/** The first rows with, over each column, what it is taken to mean; every word can be corrected. */
export function ColumnTable({
  detection,
  specification,
  species,
  onChange,
}: {
  readonly detection: Detection
  readonly specification: ColumnMapSpecification
  readonly species: readonly string[]
  readonly onChange: (specification: ColumnMapSpecification) => void
}) {
  const change = (index: number, to: Partial<MappedColumn>) =>
    onChange({
      ...specification,
      columns: specification.columns.map((column) => (column.index === index ? { ...column, ...to } : column)),
    })
  return (
    <div
      className="relative overflow-x-auto"
      role="region"
      aria-label="First rows and what the columns mean"
      tabIndex={0}
    >
      <table className="border-collapse text-[13px]">
        <caption className="sr-only">First rows and what the columns mean</caption>
        <thead>
          <tr>
            {specification.columns.map((column) => (
              <th
                key={column.index}
                scope="col"
                className="min-w-40 border-b border-line-strong px-2 py-1.5 text-left align-top font-normal first:pl-0"
              >
                <span className="block font-semibold break-words">{column.header}</span>
                <select
                  className="control mt-1 text-[13px]"
                  aria-label={`Meaning of ${column.header}`}
                  value={column.meaning}
                  onChange={(event) => {
                    const meaning = columnMeanings.find((one) => one === event.target.value)
                    if (meaning !== undefined) change(column.index, { meaning })
                  }}
                >
                  {columnMeanings.map((meaning) => (
                    <option key={meaning} value={meaning}>
                      {WORDS[meaning]}
                    </option>
                  ))}
                </select>
                {DIMENSIONS[column.meaning] === undefined ? null : (
                  <input
                    className="control mt-1 text-[13px]"
                    aria-label={`Unit of ${column.header}`}
                    placeholder="unit"
                    value={column.unit}
                    onChange={(event) => change(column.index, { unit: event.target.value })}
                  />
                )}
                {needsSpecies(column, specification.shape) ? (
                  <select
                    className="control mt-1 text-[13px]"
                    aria-label={`Species of ${column.header}`}
                    value={column.species ?? ''}
                    onChange={(event) =>
                      change(column.index, { species: event.target.value === '' ? null : event.target.value })
                    }
                  >
                    <option value="">which gas?</option>
                    {[...new Set([...species, ...(column.species === null ? [] : [column.species])])].map((name) => (
                      <option key={name} value={name}>
                        {name}
                      </option>
                    ))}
                  </select>
                ) : null}
                {column.meaning === 'flow' && unitFromAlias(column.unit, 'volume-flow') !== null ? (
                  <select
                    className="control mt-1 text-[13px]"
                    aria-label={`Reference state of ${column.header}`}
                    value={
                      column.referenceTemperatureK === null || column.referencePressurePa === null
                        ? ''
                        : referenceKey({
                            temperatureK: column.referenceTemperatureK,
                            pressurePa: column.referencePressurePa,
                          })
                    }
                    onChange={(event) => {
                      const [temperatureK, pressurePa] = event.target.value.split('/').map(Number)
                      change(column.index, {
                        referenceTemperatureK: event.target.value === '' ? null : (temperatureK ?? null),
                        referencePressurePa: event.target.value === '' ? null : (pressurePa ?? null),
                      })
                    }}
                  >
                    <option value="">volumes counted at …</option>
                    {flowReferenceChoices(
                      column.referenceTemperatureK === null || column.referencePressurePa === null
                        ? ''
                        : referenceKey({
                            temperatureK: column.referenceTemperatureK,
                            pressurePa: column.referencePressurePa,
                          }),
                    ).map((choice) => (
                      <option key={choice.value} value={choice.value}>
                        {choice.label}
                      </option>
                    ))}
                  </select>
                ) : null}
                {column.meaning === 'inlet-pressure' || column.meaning === 'outlet-pressure' ? (
                  <select
                    className="control mt-1 text-[13px]"
                    aria-label={`Gauge or absolute: ${column.header}`}
                    value={column.pressureKind ?? ''}
                    onChange={(event) =>
                      change(column.index, {
                        pressureKind:
                          event.target.value === 'gauge'
                            ? 'gauge'
                            : event.target.value === 'absolute'
                              ? 'absolute'
                              : null,
                      })
                    }
                  >
                    <option value="">as the unit says</option>
                    <option value="absolute">absolute</option>
                    <option value="gauge">gauge</option>
                  </select>
                ) : null}
                <UnitLine column={column} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {detection.firstRows.slice(0, 6).map((row, position) => (
            <tr key={`${position} ${row.join('|')}`} className="border-b border-line">
              {specification.columns.map((column) => (
                <td key={column.index} className="px-2 py-1 whitespace-nowrap first:pl-0">
                  {row[column.index] ?? ''}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
