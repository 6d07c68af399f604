import { type Caution } from '../caution'
import { type Estimate, type SharedSource } from '../estimate'
import { type Working } from '../working'
import { type ClockOffsetProposal } from './clock-offset'
import { type Species } from './run-input'

/** A time at constant set conditions, or a stretch through the bypass. */
export interface Hold {
  /** 1, 2, 3 … among the holds through the reactor, in time order; bypass stretches count apart */
  readonly number: number
  readonly kind: 'reactor' | 'bypass'
  readonly foundStartS: number
  readonly startS: number
  readonly endS: number
  readonly setTemperatureK: number
  /** earlier hold at the same conditions, when this one returns to it */
  readonly returnsTo: number | null
  readonly isEdited: boolean
}

export interface InjectionUse {
  readonly number: number
  readonly timeS: number
  readonly sourceRow: number
  readonly use: 'point' | 'inlet' | 'left-out' | 'unassigned'
  readonly holdNumber: number | null
  /** conversion seen by this one injection, product route, for the time trace; null when it cannot be said */
  readonly conversion: number | null
  /** why it was left out or not assigned, in words; empty otherwise */
  readonly reason: string
}

export type SteadyAnswer = 'steady' | 'drifting' | 'cannot-tell'

/** One hold, averaged and reduced. */
export interface Point {
  readonly hold: Hold
  readonly temperatureK: Estimate
  /** seconds since the gas first went through the reactor at the first hold's conditions; middle of the injections used */
  readonly timeOnStreamS: number
  readonly inletPressurePa: number | null
  readonly meanPressurePa: number
  readonly totalFlowMolPerS: number
  readonly keyFlowMolPerS: Estimate
  readonly inletMoleFraction: Readonly<Record<Species, number>>
  readonly conversionByProducts: Estimate | null
  readonly conversionByReactant: Estimate | null
  readonly conversion: Estimate | null
  readonly conversionRoute: 'products' | 'reactant' | 'combined' | 'none'
  readonly routeConsistencyZ: number | null
  readonly carbonSelectivity: Readonly<Record<Species, Estimate>>
  readonly carbonBalance: Estimate | null
  /** net rate of consumption of the key reactant per kilogram of catalyst, mean over the bed: F_A0 X / W */
  readonly meanRateMolPerKgS: Estimate | null
  /** forward rate at feed composition by the method's rate law: what the Arrhenius line is drawn through */
  readonly rateMolPerKgS: Estimate | null
  readonly turnoverFrequencyPerS: Estimate | null
  /** eta = Q/K of the main step at the outlet */
  readonly approachToEquilibrium: number | null
  readonly steadyState: {
    readonly answer: SteadyAnswer
    readonly driftPerH: number | null
    readonly lowPerH: number | null
    readonly highPerH: number | null
  }
  readonly injectionsUsed: readonly number[]
  readonly injectionsInHold: number
  /** set when a person left the hold out, or a rule keeps it from the fit; it stays visible */
  readonly excluded: { readonly by: string; readonly reason: string } | null
  readonly cautions: readonly Caution[]
  /** keyed by field name of this record, for example `rateMolPerKgS` */
  readonly workings: Readonly<Record<string, Working>>
}

export interface FitPoint {
  readonly holdNumber: number
  readonly runCode: string
  readonly temperatureK: number
  readonly lnRate: number
  /** random standard uncertainty of ln rate used as weight, the between-hold term included */
  readonly lnRateStandardUncertainty: number
  readonly fitted: number
  readonly residual: number
  readonly leverage: number | null
  readonly studentisedResidual: number | null
  readonly cookDistance: number | null
  readonly isUsed: boolean
  readonly reason: string
}

/** Weighted straight line of ln rate against 1/T, centred at the harmonic mean temperature. */
export interface ArrheniusFit {
  readonly quantity: 'rate' | 'turnover-frequency'
  readonly runCodes: readonly string[]
  readonly activationEnergyJPerMol: Estimate
  /** natural logarithm of A in the SI unit of the quantity (mol kg-1 s-1, or s-1) */
  readonly lnPreExponential: Estimate
  readonly centreTemperatureK: number
  readonly lnRateAtCentre: Estimate
  /** at the method's reference temperature */
  readonly lnRateAtReference: Estimate
  readonly referenceTemperatureK: number
  readonly isReferenceExtrapolated: boolean
  /** of (ln A, Ea), random part [J mol-1] */
  readonly covarianceLnAEa: number | null
  readonly confidenceLevel: number
  readonly intervals: {
    readonly activationEnergyJPerMol: readonly [number, number] | null
    readonly lnPreExponential: readonly [number, number] | null
    readonly lnRateAtReference: readonly [number, number] | null
  }
  readonly residualStandardDeviation: number | null
  readonly betweenHoldStandardDeviation: number | null
  readonly chiSquared: number | null
  readonly degreesOfFreedom: number
  readonly distinctTemperatures: number
  readonly lowestTemperatureK: number
  readonly highestTemperatureK: number
  readonly curvature: {
    readonly pValue: number
    readonly activationEnergyColdJPerMol: number
    readonly activationEnergyHotJPerMol: number
  } | null
  readonly points: readonly FitPoint[]
  readonly cautions: readonly Caution[]
  readonly workings: Readonly<Record<string, Working>>
}

export interface RunReduction {
  readonly runCode: string
  readonly holds: readonly Hold[]
  readonly injections: readonly InjectionUse[]
  readonly points: readonly Point[]
  readonly fit: ArrheniusFit | null
  /** the same line with the left-out points put back, when any were left out by a person */
  readonly fitWithAllPoints: ArrheniusFit | null
  /** why there is no fit, in words; empty when there is one */
  readonly noFitReason: string
  readonly returnedHold: {
    readonly holdNumber: number
    readonly returnsTo: number
    readonly ratio: Estimate
    readonly lossPerH: number
  } | null
  readonly meanCarbonBalance: number | null
  /** what to add to the analyser's clock as it is set now, by the turning of the valve; null where that tells nothing */
  readonly clockOffset: ClockOffsetProposal | null
  readonly sharedSources: readonly SharedSource[]
  readonly cautions: readonly Caution[]
  /** false while a grave caution stands and no lead has decided */
  readonly mayCount: boolean
}
