import { type MethodSettings } from './method'

/** How a setting is typed: a share in per cent, minutes, a bare number, a temperature in °C, or one of a list. */
export type MethodFieldKind =
  'percent' | 'minutes' | 'number' | 'kelvin' | 'celsius' | 'choice' | 'flag' | 'species' | 'species-list'

export interface MethodField {
  readonly key: keyof MethodSettings
  readonly group: string
  readonly label: string
  /** what it does, in one sentence */
  readonly help: string
  readonly kind: MethodFieldKind
  readonly choices?: readonly { readonly value: string; readonly label: string }[]
}

/** Every setting of a method but the rate orders, which are a table of their own; in the order in which a run is worked through. */
export const methodFields: readonly MethodField[] = [
  {
    key: 'holdToleranceK',
    group: 'Holds',
    label: 'A hold’s temperature may wander by [K]',
    help: 'Rows further off end the hold.',
    kind: 'kelvin',
  },
  {
    key: 'minimumHoldS',
    group: 'Holds',
    label: 'Shortest hold [min]',
    help: 'Shorter stretches are not taken for holds.',
    kind: 'minutes',
  },
  {
    key: 'settlingTimeS',
    group: 'Holds',
    label: 'Settling time [min]',
    help: 'Left out at the start of a hold, while bed and line settle.',
    kind: 'minutes',
  },
  {
    key: 'purgeInjections',
    group: 'Holds',
    label: 'Injections left out after a change',
    help: 'The line still holds the old gas.',
    kind: 'number',
  },
  {
    key: 'steadyLimitPerH',
    group: 'Holds',
    label: 'Steady within [% an hour]',
    help: 'The 90 % interval of the drift must lie inside.',
    kind: 'percent',
  },
  {
    key: 'returnedHoldLimit',
    group: 'Holds',
    label: 'A returned hold may be off by [%]',
    help: 'Beyond it, and beyond twice its uncertainty, the run has changed on stream.',
    kind: 'percent',
  },
  {
    key: 'inletSource',
    group: 'Composition',
    label: 'Feed composition from',
    help: 'The controllers stand in where the bypass was not analysed.',
    kind: 'choice',
    choices: [
      { value: 'bypass', label: 'bypass injections' },
      { value: 'controllers', label: 'flow controllers' },
    ],
  },
  {
    key: 'internalStandard',
    group: 'Composition',
    label: 'Internal standard',
    help: 'An inert of the feed that neither reacts nor condenses; empty for none.',
    kind: 'species',
  },
  {
    key: 'condensedSpecies',
    group: 'Composition',
    label: 'Removed before the analyser',
    help: 'Species that a trap takes out, apart by commas.',
    kind: 'species-list',
  },
  {
    key: 'carbonBalanceWindow',
    group: 'Composition',
    label: 'Carbon balance within ± [%]',
    help: 'Outside it the run does not count until a lead decides.',
    kind: 'percent',
  },
  {
    key: 'graveCarbonBalanceWindow',
    group: 'Composition',
    label: 'Grave beyond ± [%]',
    help: 'No rate of such a run can be trusted.',
    kind: 'percent',
  },
  {
    key: 'rateLaw',
    group: 'Rate',
    label: 'Rate law',
    help: 'Integral solves the bed with the orders below; differential takes the mean over the bed.',
    kind: 'choice',
    choices: [
      { value: 'differential', label: 'differential: r = F X / W' },
      { value: 'integral-plug-flow', label: 'integral: plug flow with the orders' },
    ],
  },
  {
    key: 'correctForEquilibrium',
    group: 'Rate',
    label: 'Take the reverse reaction into account',
    help: 'By the approach to equilibrium of each step.',
    kind: 'flag',
  },
  {
    key: 'maximumConversion',
    group: 'Rate',
    label: 'Conversion up to [%]',
    help: 'Above it the rate leans on the rate law, and a caution says so.',
    kind: 'percent',
  },
  {
    key: 'referenceTemperatureK',
    group: 'Ranking',
    label: 'Reference temperature [°C]',
    help: 'Where rates are compared; inside every sample’s range if possible.',
    kind: 'celsius',
  },
  {
    key: 'rankedBy',
    group: 'Ranking',
    label: 'Ranked by',
    help: 'Turnover frequency needs a site count.',
    kind: 'choice',
    choices: [
      { value: 'turnover-frequency', label: 'turnover frequency' },
      { value: 'rate', label: 'rate per mass' },
    ],
  },
  {
    key: 'targetConversion',
    group: 'Ranking',
    label: 'Target conversion [%]',
    help: 'The ranking states the temperature and the selectivity at it.',
    kind: 'percent',
  },
  { key: 'confidenceLevel', group: 'Ranking', label: 'Intervals at [%]', help: 'Two-sided.', kind: 'percent' },
  {
    key: 'draws',
    group: 'Ranking',
    label: 'Draws',
    help: 'From the joint distribution of the samples.',
    kind: 'number',
  },
  {
    key: 'seed',
    group: 'Ranking',
    label: 'Seed of the draws',
    help: 'Kept with the result; the same seed gives the same draws.',
    kind: 'number',
  },
  {
    key: 'flowRelativeStandardUncertainty',
    group: 'Uncertainty where no calibration says better',
    label: 'Flow controllers [%]',
    help: 'One relative standard uncertainty, shared by all runs on a rig.',
    kind: 'percent',
  },
  {
    key: 'responseFactorRelativeStandardUncertainty',
    group: 'Uncertainty where no calibration says better',
    label: 'Response factors [%]',
    help: 'One relative standard uncertainty of each factor.',
    kind: 'percent',
  },
  {
    key: 'temperatureStandardUncertaintyK',
    group: 'Uncertainty where no calibration says better',
    label: 'Bed thermocouple [K]',
    help: 'One standard uncertainty, shared by all holds of a loading.',
    kind: 'kelvin',
  },
  {
    key: 'betweenLoadingRate',
    group: 'Uncertainty where no calibration says better',
    label: 'Between packed beds, rate [%]',
    help: 'Spread of the rate from one loading to another.',
    kind: 'percent',
  },
  {
    key: 'betweenLoadingActivationEnergy',
    group: 'Uncertainty where no calibration says better',
    label: 'Between packed beds, activation energy [%]',
    help: 'Spread of the activation energy from one loading to another.',
    kind: 'percent',
  },
]

const trimmed = (value: number) => String(Number(value.toPrecision(12)))

/** A setting as it stands in its field. */
export function methodFieldText(field: MethodField, settings: MethodSettings): string {
  const value = settings[field.key]
  if (value === null) return ''
  if (Array.isArray(value)) return value.filter((entry) => typeof entry === 'string').join(', ')
  if (typeof value !== 'number') return String(value)
  if (field.kind === 'percent') return trimmed(value * 100)
  if (field.kind === 'minutes') return trimmed(value / 60)
  if (field.kind === 'celsius') return trimmed(value - 273.15)
  return trimmed(value)
}

/** A number as typed in its field, back in the unit of the setting. */
export function methodFieldValue(field: MethodField, typed: number): number {
  if (field.kind === 'percent') return Number((typed / 100).toPrecision(12))
  if (field.kind === 'minutes') return typed * 60
  if (field.kind === 'celsius') return Number((typed + 273.15).toPrecision(12))
  return typed
}

/** `CO2 0.15, H2 0.4` as orders by species; null where it cannot be read. */
export function readOrders(text: string): Record<string, number> | null {
  const orders: Record<string, number> = {}
  for (const part of text.split(/[,;]\s*(?=[A-Za-z(])/).filter((entry) => entry.trim() !== '')) {
    const found = /^\s*([A-Za-z][A-Za-z0-9()]*)\s*[:=^]?\s*([-−+]?\d+(?:[.,]\d+)?)\s*$/.exec(part)
    const species = found?.[1]
    const order = Number(found?.[2]?.replace(',', '.').replace('−', '-'))
    if (species === undefined || !Number.isFinite(order)) return null
    orders[species] = order
  }
  return orders
}

export function writeOrders(orders: Readonly<Record<string, number>>): string {
  return Object.keys(orders)
    .sort()
    .map((species) => `${species} ${orders[species] ?? 0}`)
    .join(', ')
}
