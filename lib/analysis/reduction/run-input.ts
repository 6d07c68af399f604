import { type EnteredThermochemistry } from '../equilibrium/thermochemistry'
import { type SharedSource } from '../estimate'

/** Species by formula (`CO2`, `H2`, …), as the reaction and the calibrations name them. */
export type Species = string

/** One overall reaction, stoichiometric numbers positive for products: `{ CO2: -1, H2: -4, CH4: 1, H2O: 2 }`. */
export type Stoichiometry = Readonly<Record<Species, number>>

/** The rig's continuous log, SI, in time order. All arrays have the same length; NaN marks a missing value. */
export interface RigLog {
  readonly uploadId: string
  readonly fileName: string
  /** seconds since the Unix epoch, UTC */
  readonly timeS: Float64Array
  /** one-based row in the file, for the working */
  readonly sourceRow: Float64Array
  readonly bedTemperatureK: Float64Array
  readonly setTemperatureK: Float64Array | null
  readonly wallTemperatureK: Float64Array | null
  /** absolute */
  readonly inletPressurePa: Float64Array | null
  readonly outletPressurePa: Float64Array | null
  readonly flowMolPerS: Readonly<Record<Species, Float64Array>>
  /** 1 where the gas goes round the reactor, 0 where through it; null when the rig has no such column */
  readonly isBypass: Float64Array | null
}

/** Analyser results, one entry an injection, in time order, already on the rig's clock (offset applied by the caller). */
export interface InjectionTable {
  readonly uploadId: string
  readonly fileName: string
  readonly timeS: Float64Array
  readonly number: Float64Array
  readonly sourceRow: Float64Array
  readonly lastSourceRow: Float64Array
  /** peak area in counts (or, with `quantity: 'mole-fraction'`, the fraction itself); NaN where nothing was reported */
  readonly response: Readonly<Record<Species, Float64Array>>
  /** 1 where the file says "below the limit of detection" or leaves a peak blank, else 0 */
  readonly isCensored: Readonly<Record<Species, Float64Array>>
  readonly quantity: 'area' | 'mole-fraction'
}

/** Response factor of one species: mole fraction per area count. A sensitivity in a file is turned into a factor at intake. */
export interface ResponseFactor {
  readonly molePerArea: number
  readonly relativeStandardUncertainty: number
  /** id in `sharedSources` */
  readonly sourceId: string
}

/** A person's change to a hold: its window, or its being left out. Keyed by the hold's start as found by rule. */
export interface HoldEdit {
  readonly foundStartS: number
  readonly startS: number | null
  readonly endS: number | null
}

/** A point or an injection left out by a person, with the reason. It stays visible and both fits are shown. */
export interface Exclusion {
  readonly kind: 'hold' | 'injection'
  /** start of the hold as found by rule, or time of the injection, seconds since the epoch */
  readonly atS: number
  readonly reason: string
  readonly by: string
}

export interface ReactionInput {
  readonly name: string
  readonly keyReactant: Species
  /** first step is the main one; every step consumes the key reactant */
  readonly steps: readonly Stoichiometry[]
  /** carbon atoms of each carbon-bearing species */
  readonly carbonNumber: Readonly<Record<Species, number>>
  /** entered with the reaction, for species the built-in table does not hold */
  readonly thermochemistry?: Readonly<Record<Species, EnteredThermochemistry>>
}

export interface LoadingInput {
  readonly catalystMassKg: number
  readonly massRelativeStandardUncertainty: number
  readonly massSourceId: string
  readonly diluentMassKg: number
  readonly particleDiameterM: number | null
  readonly tubeInnerDiameterM: number | null
  readonly bedLengthM: number | null
  readonly particleDensityKgPerM3: number | null
  readonly poreFraction: number | null
  readonly tortuosity: number | null
  readonly meanPoreRadiusM: number | null
  readonly bedVoidFraction: number | null
}

export interface SiteCountInput {
  readonly molPerKg: number
  readonly relativeStandardUncertainty: number
  readonly sourceId: string
  readonly method: string
}

/** What the campaign's method settles; the form and its defaults stand in lib/domain/method.ts. */
export interface ReductionMethod {
  readonly rateLaw: 'differential' | 'integral-plug-flow'
  /** reaction orders in partial pressure, one record a step of the reaction */
  readonly rateOrders: readonly Readonly<Record<Species, number>>[]
  readonly inletSource: 'bypass' | 'controllers'
  readonly internalStandard: Species | null
  /** species removed before the analyser, such as water in a trap */
  readonly condensedSpecies: readonly Species[]
  readonly maximumConversion: number
  readonly carbonBalanceWindow: number
  readonly graveCarbonBalanceWindow: number
  /** the set-point may wander by this much and still be one hold */
  readonly holdToleranceK: number
  readonly minimumHoldS: number
  /** left out at the start of a hold, while the bed and the line settle */
  readonly settlingTimeS: number
  /** injections left out after a change of conditions, whatever the time */
  readonly purgeInjections: number
  readonly steadyLimitPerH: number
  readonly returnedHoldLimit: number
  readonly referenceTemperatureK: number
  readonly confidenceLevel: number
  readonly correctForEquilibrium: boolean
}

/** Everything that goes into the reduction of one run. Equal inputs give equal bits. */
export interface RunInput {
  readonly runCode: string
  readonly kind: 'catalyst' | 'blank' | 'diluent'
  readonly log: RigLog
  readonly injections: InjectionTable
  readonly responseFactors: Readonly<Record<Species, ResponseFactor>>
  readonly reaction: ReactionInput
  readonly loading: LoadingInput
  readonly siteCount: SiteCountInput | null
  readonly method: ReductionMethod
  readonly holdEdits: readonly HoldEdit[]
  readonly exclusions: readonly Exclusion[]
  /** flow controllers' shared source; for plus one standard uncertainty the true flow is larger: rates go up by as much, conversion stays */
  readonly flowSourceId: string
  readonly thermocoupleSourceId: string
  readonly sharedSources: readonly SharedSource[]
}
