'use client'

import { type Caution } from '@/lib/analysis/caution'
import { type ArrheniusFit } from '@/lib/analysis/reduction/run-reduction'
import { formatFixed } from '@/components/numbers/format-fixed'
import { halfWidth } from '@/components/numbers/half-width'
import { practicalUnits } from '@/components/numbers/practical-units'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { CautionTag } from '@/components/working/caution-tag'

export interface NamedFit {
  readonly name: string
  readonly fit: ArrheniusFit
  /** doubts about the run or sample that bear on the line without having been raised by it, such as a loss on stream */
  readonly about?: readonly Caution[]
}

function cautionsOf({ fit, about = [] }: NamedFit): Caution[] {
  return [...about.filter(({ code }) => !fit.cautions.some((one) => one.code === code)), ...fit.cautions]
}

interface FitTableProps {
  readonly caption: string
  readonly fits: readonly NamedFit[]
  readonly onOpen?: (fit: ArrheniusFit, key: string) => void
}

const optional = (value: number | null, decimals: number) => (value === null ? '–' : formatFixed(value, decimals))

/** Lines side by side: what they say and what they rest on. */
export function FitTable({ caption, fits, onOpen }: FitTableProps) {
  const head = 'border-b border-line-strong px-2 py-1 align-bottom text-[12.5px] leading-tight font-semibold text-ink-2'
  const level = fits[0]?.fit.confidenceLevel ?? 0.95
  const quantity = (fit: ArrheniusFit, key: 'activationEnergyJPerMol' | 'lnPreExponential') => {
    const unit = key === 'activationEnergyJPerMol' ? practicalUnits.activationEnergy : null
    const half = halfWidth(fit.intervals[key])
    const value = unit ? unit.fromSi(fit[key].value) : fit[key].value
    const content = (
      <>
        <ValueWithUncertainty
          value={value}
          uncertainty={half === null ? null : unit ? unit.differenceFromSi(half) : half}
        />
        {half === null ? <span className="text-[.84em] text-ink-3"> ± ?</span> : null}
      </>
    )
    if (!onOpen || !fit.workings[key]) return content
    return (
      <button
        type="button"
        onClick={() => onOpen(fit, key)}
        className="min-h-6 cursor-pointer decoration-ink-3 decoration-dotted underline-offset-4 hover:underline touch:min-h-11"
      >
        {content}
      </button>
    )
  }
  return (
    <div className="relative overflow-x-auto" role="region" aria-label={caption} tabIndex={0}>
      <table className="mt-1.5 w-full border-collapse">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            <th scope="col" className={`${head} text-left`}>
              Line
            </th>
            {[
              ['Ea', 'kJ mol⁻¹'],
              [
                'ln A',
                fits[0]?.fit.quantity === 'turnover-frequency' ? 'A in s⁻¹' : practicalUnits.lnPreExponential.label,
              ],
              ['Holds', 'temperatures'],
              ['Span', '°C'],
              ['Residual', 's of ln r'],
              ['Between holds', 's of ln r'],
              ['χ²', 'on ν'],
              ['Bend', 'p'],
            ].map(([name = '', unit = '']) => (
              <th key={name} scope="col" className={`${head} text-right whitespace-nowrap`}>
                {name}
                <span className="block font-normal text-ink-3">{unit}</span>
              </th>
            ))}
            <th scope="col" className={`${head} text-left`}>
              Cautions
            </th>
          </tr>
        </thead>
        <tbody>
          {fits.map(({ name, fit, about = [] }) => (
            <tr key={name} className="border-b border-line">
              <th scope="row" className="px-2 py-1 text-left font-normal whitespace-nowrap">
                {name}
              </th>
              <td className="px-2 py-1 text-right whitespace-nowrap">{quantity(fit, 'activationEnergyJPerMol')}</td>
              <td className="px-2 py-1 text-right whitespace-nowrap">{quantity(fit, 'lnPreExponential')}</td>
              <td className="px-2 py-1 text-right">
                {fit.points.filter((point) => point.isUsed).length}{' '}
                <span className="text-ink-3">at {fit.distinctTemperatures}</span>
              </td>
              <td className="px-2 py-1 text-right whitespace-nowrap">
                {formatFixed(fit.lowestTemperatureK - 273.15, 0)} to {formatFixed(fit.highestTemperatureK - 273.15, 0)}
              </td>
              <td className="px-2 py-1 text-right">{optional(fit.residualStandardDeviation, 4)}</td>
              <td className="px-2 py-1 text-right">{optional(fit.betweenHoldStandardDeviation, 4)}</td>
              <td className="px-2 py-1 text-right whitespace-nowrap">
                {optional(fit.chiSquared, 1)} <span className="text-ink-3">on {fit.degreesOfFreedom}</span>
              </td>
              <td className="px-2 py-1 text-right">
                {fit.curvature === null
                  ? '–'
                  : fit.curvature.pValue < 0.0001
                    ? '< 0.0001'
                    : formatFixed(fit.curvature.pValue, 4)}
              </td>
              <td className="px-2 py-1">
                <span className="flex flex-wrap gap-1">
                  {cautionsOf({ name, fit, about }).length === 0 ? <span className="text-ink-3">none</span> : null}
                  {cautionsOf({ name, fit, about }).map((caution, index) => (
                    <CautionTag key={`${caution.code}-${index}`} caution={caution} />
                  ))}
                </span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-1 mb-0 text-[12.5px] text-ink-3">
        ± is half of the {Math.round(level * 100)} % interval of the line; errors that all its points share are in it.
        The ranking adds the spread between packed beds.
      </p>
    </div>
  )
}
