import { AnalysisError } from '../analysis-error'
import { fitArrhenius, type ArrheniusPoint } from '../arrhenius/fit-arrhenius'
import { type Caution } from '../caution'
import { mayCountWith, raiseCaution } from '../cautions'
import { type Estimate, type SharedSource } from '../estimate'
import { totalUncertainty } from '../total-uncertainty'
import { conversionOfInjection, measureConversions, type HoldConversion } from './conversion'
import { planGasAnalysis } from './gas-analysis'
import { type ClockOffsetProposal, proposeClockOffset } from './clock-offset'
import { averageConditions, type HoldConditions } from './hold-conditions'
import { findHolds } from './holds'
import { assignInjections, type AssignedInjection } from './injections'
import { inletMoleFractions, measureInlet } from './inlet'
import { AT_EQUILIBRIUM, pointCautions } from './point-cautions'
import { pointWorkings } from './point-workings'
import { rateOfHold, type RateResult } from './rate'
import { judgeReturnedHold, returnedHoldCautions, withoutLoss } from './returned-hold'
import { type RunInput } from './run-input'
import { type ArrheniusFit, type Hold, type InjectionUse, type Point, type RunReduction } from './run-reduction'
import { judgeSteadiness } from './steady-state'

/** A logarithm needs a value above three times its uncertainty. */
const QUANTIFIABLE = 3
const SAME_HOLD_S = 1
const DEFAULT_PRESSURE_PA = 101_325

/** One hold on its way to a point. */
interface Draft {
  readonly hold: Hold
  readonly assigned: readonly AssignedInjection[]
  readonly conditions: HoldConditions
}

function sourceOf(input: RunInput, id: string): SharedSource | null {
  return input.sharedSources.find((source) => source.id === id) ?? null
}

function keyFlow(input: RunInput, conditions: HoldConditions): Estimate {
  const flow = conditions.flowMolPerS[input.reaction.keyReactant]
  if (flow === undefined || !(flow > 0))
    throw new AnalysisError(
      'missing-input',
      `The rig log has no flow of ${input.reaction.keyReactant}; without it there is no rate. Map its column, or write the feed down with the run.`,
      { species: input.reaction.keyReactant },
    )
  const source = sourceOf(input, input.flowSourceId)
  return {
    value: flow,
    randomStandardUncertainty: 0,
    degreesOfFreedom: null,
    sharedEffects: source === null ? {} : { [source.id]: flow * source.standardUncertainty },
  }
}

function perSite(rate: Estimate | null, input: RunInput): Estimate | null {
  const sites = input.siteCount
  if (rate === null || sites === null || !(sites.molPerKg > 0)) return null
  const sharedEffects: Record<string, number> = {}
  for (const id of Object.keys(rate.sharedEffects).sort())
    sharedEffects[id] = (rate.sharedEffects[id] ?? 0) / sites.molPerKg
  const value = rate.value / sites.molPerKg
  sharedEffects[sites.sourceId] = (sharedEffects[sites.sourceId] ?? 0) - sites.relativeStandardUncertainty * value
  return {
    value,
    randomStandardUncertainty:
      rate.randomStandardUncertainty === null ? null : rate.randomStandardUncertainty / sites.molPerKg,
    degreesOfFreedom: rate.degreesOfFreedom,
    sharedEffects,
  }
}

// Why a point cannot be in the line, by rule; empty when it can.
function ruleAgainst(rate: RateResult | null, approach: number | null): string {
  if (rate === null) return 'no injection of this hold can be used'
  if (rate.rate === null) return rate.reason
  const u = rate.rate.randomStandardUncertainty
  if (u !== null && rate.rate.value < QUANTIFIABLE * u)
    return 'the rate is not above three times its uncertainty: it cannot go into a logarithm'
  if (approach !== null && approach > AT_EQUILIBRIUM) return 'the gas leaves near equilibrium: the rate is not kinetic'
  return ''
}

function meanEstimate(estimates: readonly Estimate[]): Estimate | null {
  if (estimates.length === 0) return null
  let value = 0
  let variance: number | null = 0
  const sharedEffects: Record<string, number> = {}
  for (const estimate of estimates) {
    value += estimate.value / estimates.length
    const own = estimate.randomStandardUncertainty
    variance = own === null || variance === null ? null : variance + (own * own) / (estimates.length * estimates.length)
    for (const id of Object.keys(estimate.sharedEffects).sort())
      sharedEffects[id] = (sharedEffects[id] ?? 0) + (estimate.sharedEffects[id] ?? 0) / estimates.length
  }
  return {
    value,
    randomStandardUncertainty: variance === null ? null : Math.sqrt(variance),
    degreesOfFreedom: estimates[0]?.degreesOfFreedom ?? null,
    sharedEffects,
  }
}

function balanceCautions(input: RunInput, balance: Estimate | null): Caution[] {
  if (balance === null) return []
  const { carbonBalanceWindow, graveCarbonBalanceWindow } = input.method
  const off = Math.abs(balance.value - 1)
  const u = totalUncertainty(balance)?.standardUncertainty ?? 0
  if (off > Math.max(graveCarbonBalanceWindow, 2 * u))
    return [raiseCaution('carbon-balance-far-off', { value: balance.value, limit: graveCarbonBalanceWindow })]
  if (off > Math.max(carbonBalanceWindow, 2 * u))
    return [raiseCaution('carbon-balance', { value: balance.value, limit: carbonBalanceWindow })]
  return []
}

interface LineOutcome {
  readonly fit: ArrheniusFit | null
  readonly reason: string
}

function fitLine(input: RunInput, points: readonly ArrheniusPoint[]): LineOutcome {
  if (input.kind !== 'catalyst')
    return {
      fit: null,
      reason: 'A blank has no line: it says what the empty tube and the diluent do, and nothing is ranked by it.',
    }
  try {
    return {
      fit: fitArrhenius({
        quantity: 'rate',
        points,
        referenceTemperatureK: input.method.referenceTemperatureK,
        confidenceLevel: input.method.confidenceLevel,
        subject: input.runCode,
      }),
      reason: '',
    }
  } catch (error) {
    if (error instanceof AnalysisError) return { fit: null, reason: error.message }
    throw error
  }
}

function linePoints(input: RunInput, points: readonly Point[], isUsed: (point: Point) => boolean): ArrheniusPoint[] {
  return points.flatMap((point): ArrheniusPoint[] =>
    point.rateMolPerKgS === null
      ? []
      : [
          {
            runCode: input.runCode,
            holdNumber: point.hold.number,
            temperatureK: point.temperatureK,
            quantity: point.rateMolPerKgS,
            isUsed: isUsed(point),
            reason: isUsed(point) ? '' : (point.excluded?.reason ?? ''),
          },
        ],
  )
}

function injectionUses(
  input: RunInput,
  assigned: readonly AssignedInjection[],
  conversionAt: (index: number) => number | null,
): InjectionUse[] {
  return assigned.map(({ index, use, hold, reason }) => ({
    number: input.injections.number[index] ?? index + 1,
    timeS: input.injections.timeS[index] ?? Number.NaN,
    sourceRow: input.injections.sourceRow[index] ?? Number.NaN,
    use,
    holdNumber: hold?.kind === 'reactor' ? hold.number : null,
    conversion: hold?.kind === 'bypass' ? null : conversionAt(index),
    reason,
  }))
}

function notFinite(input: RunInput): void {
  if (input.log.timeS.length === 0)
    throw new AnalysisError('missing-input', 'The rig log has no rows.', { fileName: input.log.fileName })
  if (!input.log.bedTemperatureK.some((value) => Number.isFinite(value)))
    throw new AnalysisError(
      'missing-input',
      'The rig log has no bed temperature. Map the column of the bed thermocouple and confirm the file again.',
      { fileName: input.log.fileName },
    )
}

/**
 * Everything that is made of one run: holds, injections, points, the Arrhenius line, the returned hold, and every doubt about them.
 *
 * Holds from set-point, bed temperature, flows and valve; injections assigned by time; feed from the bypass or the controllers; conversion by both
 * routes; rate by the method's law; line by weighted least squares with the default error model. A hold that returns to earlier conditions is in the
 * line unless it shows a change on stream beyond its limit; then it stands beside it as the measure of that change. Nothing is clipped and nothing
 * is dropped: what is left out stays listed with its reason. Pure and deterministic.
 * Source: see the single steps.
 *
 * @param input - readings, records and method [SI]
 * @returns the whole reduction; degrees of freedom stand in each estimate [SI]
 * @throws {AnalysisError} missing-input where a column or record is absent that every number needs
 */
export function reduceRun(input: RunInput): RunReduction {
  notFinite(input)
  const { method, injections } = input
  const holds = findHolds(input.log, method, input.holdEdits)
  const analysis = planGasAnalysis(
    injections,
    input.responseFactors,
    input.reaction,
    method.internalStandard,
    method.condensedSpecies,
  )
  const assigned = assignInjections(injections, holds, method, input.exclusions)
  const thermocouple = sourceOf(input, input.thermocoupleSourceId)
  const drafts: Draft[] = holds
    .filter((hold) => hold.kind === 'reactor')
    .map((hold) => ({
      hold,
      assigned: assigned.filter((entry) => entry.hold === hold),
      conditions: averageConditions(input.log, hold, method.settlingTimeS, thermocouple),
    }))
  const usedIndices = (draft: Draft): number[] =>
    draft.assigned.filter((entry) => entry.use === 'point').map((entry) => entry.index)

  const { inlet, cautions: inletCautions } = measureInlet(
    injections,
    analysis,
    assigned.filter((entry) => entry.use === 'inlet').map((entry) => entry.index),
    drafts[0]?.conditions.flowMolPerS ?? {},
    method,
  )
  const inletSourceId = `inlet:${input.runCode}`
  const measured = measureConversions(
    injections,
    analysis,
    inlet,
    drafts.map((draft) => ({ indices: usedIndices(draft) })),
    input.reaction.steps.length,
    inletSourceId,
  )
  const sharedSources: SharedSource[] = [
    ...input.sharedSources,
    ...(measured.inletUncertainty > 0
      ? [
          {
            id: inletSourceId,
            kind: 'inlet' as const,
            label: `feed analysis of ${input.runCode} through the bypass`,
            standardUncertainty: measured.inletUncertainty,
            unit: '1',
          },
        ]
      : []),
  ]
  const firstStartS = drafts[0]?.hold.startS ?? 0
  const conversionAt = (index: number): number | null => conversionOfInjection(injections, analysis, inlet, index)

  const points = drafts.map((draft, position): Point => {
    const conversion = measured.holds[position] as HoldConversion
    return reducePoint(draft, conversion)
  })

  function reducePoint(draft: Draft, conversion: HoldConversion): Point {
    const { hold, conditions } = draft
    const indices = usedIndices(draft)
    const times = indices.map((index) => injections.timeS[index] ?? Number.NaN)
    const middleS =
      times.length > 0 ? ((times[0] ?? 0) + (times[times.length - 1] ?? 0)) / 2 : (hold.startS + hold.endS) / 2
    const flow = keyFlow(input, conditions)
    const inletMoleFraction = inletMoleFractions(analysis, inlet, conditions.flowMolPerS)
    const meanPressurePa = conditions.meanPressurePa ?? DEFAULT_PRESSURE_PA
    const chosen = indices.length > 0 ? conversion.chosen : null
    const rate: RateResult | null =
      chosen === null
        ? null
        : rateOfHold({
            reaction: input.reaction,
            method,
            temperatureK: conditions.temperatureK.value,
            pressurePa: meanPressurePa,
            inletMoleFraction,
            keyFlowMolPerS: flow,
            catalystMassKg: input.loading.catalystMassKg,
            massSourceId: input.loading.massSourceId,
            massRelativeStandardUncertainty: input.loading.massRelativeStandardUncertainty,
            conversion: chosen,
            stepConversions: conversion.stepConversions,
          })
    const perInjection = indices.map((index) => conversionAt(index))
    const steadyState = perInjection.every((value) => value !== null)
      ? judgeSteadiness(
          times,
          perInjection.map((value) => value ?? Number.NaN),
          measured.productScatter,
          measured.scatterDegreesOfFreedom,
          method.steadyLimitPerH,
        )
      : { answer: 'cannot-tell' as const, driftPerH: null, lowPerH: null, highPerH: null }
    const byPerson = input.exclusions.find(
      (entry) => entry.kind === 'hold' && Math.abs(entry.atS - hold.foundStartS) <= SAME_HOLD_S,
    )
    const rule = ruleAgainst(rate, rate?.approach ?? null)
    const base = {
      hold,
      temperatureK: conditions.temperatureK,
      timeOnStreamS: middleS - firstStartS,
      inletPressurePa: conditions.inletPressurePa,
      meanPressurePa,
      totalFlowMolPerS: conditions.totalFlowMolPerS,
      keyFlowMolPerS: flow,
      inletMoleFraction,
      conversionByProducts: conversion.byProducts,
      conversionByReactant: conversion.byReactant,
      conversion: chosen,
      conversionRoute: chosen === null ? ('none' as const) : conversion.route,
      routeConsistencyZ: conversion.consistencyZ,
      carbonSelectivity: conversion.carbonSelectivity,
      carbonBalance: indices.length > 0 ? conversion.carbonBalance : null,
      meanRateMolPerKgS: rate?.meanRate ?? null,
      rateMolPerKgS: rate?.rate ?? null,
      turnoverFrequencyPerS: perSite(rate?.rate ?? null, input),
      approachToEquilibrium: rate?.approach ?? null,
      steadyState,
      injectionsUsed: indices.map((index) => injections.number[index] ?? index + 1),
      injectionsInHold: draft.assigned.length,
      excluded:
        byPerson !== undefined
          ? { by: byPerson.by, reason: byPerson.reason }
          : rule !== ''
            ? { by: 'rule', reason: rule }
            : null,
    }
    const cautions = pointCautions(input, analysis, conversion, base)
    if (rule !== '' && rate?.rate !== null && chosen !== null && rule.includes('three times'))
      cautions.push(raiseCaution('nothing-converted', { value: chosen.value, limit: null, holdNumber: hold.number }))
    const withCautions = { ...base, cautions }
    return {
      ...withCautions,
      workings: pointWorkings(withCautions, {
        input,
        analysis,
        inlet,
        conditions,
        conversion,
        rate,
        injectionRows: indices.map((index): readonly [number, number] => [
          injections.sourceRow[index] ?? Number.NaN,
          injections.lastSourceRow[index] ?? Number.NaN,
        ]),
        leftOut: draft.assigned
          .filter((entry) => entry.use === 'left-out')
          .map((entry) => `injection ${injections.number[entry.index] ?? entry.index + 1}: ${entry.reason}`),
        scatter: {
          products: measured.productScatter,
          reactant: measured.reactantScatter,
          inlet: measured.inletUncertainty,
        },
      }),
    }
  }

  const clockOffset = proposeClockOffset(
    input.log,
    injections,
    analysis.products
      .map((product) => product.species)
      .filter((species) => !((drafts[0]?.conditions.flowMolPerS[species] ?? 0) > 0)),
    analysis.base,
    0,
  )
  return {
    ...lineOf(input, points, [...inletCautions, ...outsideCautions(input), ...clockCautions(clockOffset)]),
    clockOffset,
    holds,
    injections: injectionUses(input, assigned, conversionAt),
    sharedSources,
  }
}

/** A few standby injections before the start are usual; a fifth of them are not. */
const SHARE_OUTSIDE = 0.2

function outsideCautions(input: RunInput): Caution[] {
  const { timeS } = input.log
  const [first, last] = [timeS[0] ?? Number.NaN, timeS[timeS.length - 1] ?? Number.NaN]
  const times = Array.from(input.injections.timeS).filter((time) => Number.isFinite(time))
  const count = times.filter((time) => time < first || time > last).length
  if (!(count > SHARE_OUTSIDE * times.length)) return []
  return [
    raiseCaution('injections-outside-log', {
      value: count / times.length,
      limit: SHARE_OUTSIDE,
      more: { count, all: times.length },
    }),
  ]
}

/** One injection more may be the old gas in the line after a turn of the valve; two are not. */
const INJECTIONS_TO_DOUBT_A_CLOCK = 2

function clockCautions(clock: ClockOffsetProposal | null): Caution[] {
  if (clock === null || clock.agreeing - clock.agreeingAsSet < INJECTIONS_TO_DOUBT_A_CLOCK) return []
  return [
    raiseCaution('clocks-disagree', {
      value: clock.offsetS,
      limit: null,
      more: {
        low: clock.lowS,
        high: clock.highS,
        agreeing: clock.agreeing,
        compared: clock.compared,
        asSet: clock.agreeingAsSet,
      },
    }),
  ]
}

// The line, the returned hold and the doubts about the run as a whole.
function lineOf(
  input: RunInput,
  reduced: readonly Point[],
  inletCautions: readonly Caution[],
): Omit<RunReduction, 'holds' | 'injections' | 'sharedSources' | 'clockOffset'> {
  const { method } = input
  const isFree = (point: Point): boolean => point.excluded === null
  const first = fitLine(
    input,
    linePoints(input, reduced, (point) => isFree(point) && point.hold.returnsTo === null),
  )
  const returnedHold = judgeReturnedHold(reduced.filter(isFree), first.fit?.activationEnergyJPerMol.value ?? null)
  const loss = returnedHold?.lossPerH ?? 0
  const corrected =
    returnedHold === null || first.fit === null
      ? null
      : fitLine(
          input,
          linePoints(input, reduced, isFree).map((entry) => {
            const point = reduced.find((candidate) => candidate.hold.number === entry.holdNumber)
            return { ...entry, quantity: withoutLoss(entry.quantity, point?.timeOnStreamS ?? 0, loss) }
          }),
        ).fit
  const returnedPoint = reduced.find((point) => point.hold.number === returnedHold?.holdNumber)
  const lossCautions =
    returnedHold === null || returnedPoint === undefined
      ? []
      : returnedHoldCautions(
          returnedHold,
          returnedPoint.temperatureK.value,
          method.returnedHoldLimit,
          corrected?.activationEnergyJPerMol.value ?? null,
        )
  // a returned hold that shows a change measures the change; in the line it would only scatter
  const hasChanged = lossCautions.length > 0
  const points = hasChanged
    ? reduced.map((point) =>
        point.hold.returnsTo !== null && point.excluded === null
          ? {
              ...point,
              excluded: {
                by: 'rule',
                reason: 'returned hold: it measures the change on stream and is not part of the line',
              },
            }
          : point,
      )
    : [...reduced]
  const line = fitLine(input, linePoints(input, points, isFree))
  const isLeftOutByPerson = (point: Point): boolean => point.excluded !== null && point.excluded.by !== 'rule'
  const all = points.some(isLeftOutByPerson)
    ? fitLine(
        input,
        linePoints(input, points, (point) => isFree(point) || isLeftOutByPerson(point)),
      ).fit
    : null
  const balances = points.filter((point) => !isLeftOutByPerson(point)).flatMap((point) => point.carbonBalance ?? [])
  const balance = meanEstimate(balances)
  const pore = points
    .flatMap((point) => point.cautions)
    .filter((caution) => caution.code === 'pore-diffusion-likely')
    .sort((a, b) => (b.value ?? 0) - (a.value ?? 0))
  const cautions: Caution[] = [
    ...inletCautions,
    ...balanceCautions(input, balance),
    ...lossCautions,
    // of the holds in which the particle's inside is poorer, the worst speaks for the run
    ...pore.slice(0, 1),
  ]
  const everything = [
    ...cautions,
    ...(line.fit?.cautions ?? []),
    ...points.filter((point) => point.excluded === null).flatMap((point) => point.cautions),
  ]
  return {
    runCode: input.runCode,
    points,
    fit: line.fit,
    fitWithAllPoints: all,
    noFitReason: line.reason,
    returnedHold,
    meanCarbonBalance: balance?.value ?? null,
    cautions,
    mayCount: mayCountWith(everything),
  }
}
