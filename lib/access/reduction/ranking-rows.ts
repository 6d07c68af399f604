import 'server-only'
import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../../analysis/analysis-error'
import { fitArrhenius, type ArrheniusPoint } from '../../analysis/arrhenius/fit-arrhenius'
import { type Caution } from '../../analysis/caution'
import { mayCountWith, raiseCaution } from '../../analysis/cautions'
import { type Estimate } from '../../analysis/estimate'
import { type SiteCountInput } from '../../analysis/reduction/run-input'
import { type ArrheniusFit, type RunReduction } from '../../analysis/reduction/run-reduction'
import { rankSamples, type RankResult } from '../../analysis/ranking/rank-samples'
import { intervalOf } from '../../analysis/total-uncertainty'
import { type CampaignSample } from '../../domain/campaign'
import { type MethodSettings } from '../../domain/method'
import { type RankingRow, type RankingRun } from '../../domain/ranking'
import { type RunDecision, type RunState } from '../../domain/run'
import { withBetweenLoading } from './between-loading'
import { rowFigures } from './ranking-row-figures'
import { exponential, rowWorkings, type SampleNumbers } from './ranking-row-workings'
import { type ReducedRun } from './reduce-runs'

export interface RankingRequest {
  readonly samples: readonly CampaignSample[]
  readonly runs: readonly ReducedRun[]
  readonly settings: MethodSettings
  readonly referenceTemperatureK: number
  readonly includeProvisional: boolean
}

/** What the line of a sample that lost activity on stream hides, run by run. */
function lossSentences(reductions: readonly RunReduction[]): string[] {
  return reductions.flatMap(({ runCode, cautions }) =>
    cautions
      .filter(({ code }) => code === 'deactivation' || code === 'strong-deactivation')
      .map(({ sentence }) => `${runCode}: ${sentence} The line rests on the rates as they were measured.`),
  )
}

/** Why a run is not in its sample's line; empty when it is. */
function whyLeftOut(entry: ReducedRun, includeProvisional: boolean): string {
  const { run, reduction, notReadyReason } = entry
  if (run.kind !== 'catalyst') return 'a blank: nothing to rank'
  if (reduction === null) return notReadyReason
  if (run.decision === 'set-aside') return 'set aside by the lead'
  if (reduction.fit === null) return reduction.noFitReason
  if (run.decision === 'counts') return ''
  if (!includeProvisional)
    return run.decision === 'repeat'
      ? 'to be repeated; provisional runs are switched off'
      : 'not decided yet; provisional runs are switched off'
  if (run.decision === null && !reduction.mayCount) return `does not count until a lead decides: ${gravest(reduction)}`
  return ''
}

function allCautions(reduction: RunReduction): Caution[] {
  return [...reduction.cautions, ...(reduction.fit?.cautions ?? [])]
}

function gravest(reduction: RunReduction): string {
  return allCautions(reduction).find((caution) => !mayCountWith([caution]))?.sentence ?? 'a grave caution stands.'
}

function rankingRun(entry: ReducedRun, includeProvisional: boolean): RankingRun {
  const reason = whyLeftOut(entry, includeProvisional)
  return {
    runId: entry.run.runId,
    code: entry.run.code,
    state: entry.run.state as RunState,
    decision: entry.run.decision as RunDecision | null,
    isIncluded: reason === '',
    reason,
  }
}

/** Points of a run as its own line saw them: what a person or a rule left out there is left out here, with the same reason. */
function linePoints(reduction: RunReduction): ArrheniusPoint[] {
  const seen = new Map((reduction.fit?.points ?? []).map((point) => [point.holdNumber, point]))
  return reduction.points.flatMap((point) => {
    const inFit = seen.get(point.hold.number)
    if (point.rateMolPerKgS === null || inFit === undefined) return []
    return [
      {
        runCode: reduction.runCode,
        holdNumber: point.hold.number,
        temperatureK: point.temperatureK,
        quantity: point.rateMolPerKgS,
        isUsed: inFit.isUsed,
        reason: inFit.reason,
      },
    ]
  })
}

function expInterval(lnEstimate: Estimate, level: number): readonly [number, number] | null {
  const interval = intervalOf(lnEstimate, level)
  return interval === null ? null : [exp(interval[0]), exp(interval[1])]
}

/** ln of the turnover frequency: the rate over the sites, whose count is one error for all temperatures. */
function lnPerSite(lnRate: Estimate, sites: SiteCountInput): Estimate {
  return {
    ...lnRate,
    value: lnRate.value - ln(sites.molPerKg),
    sharedEffects: {
      ...lnRate.sharedEffects,
      [sites.sourceId]: (lnRate.sharedEffects[sites.sourceId] ?? 0) - sites.relativeStandardUncertainty,
    },
  }
}

const emptyNumbers = {
  rank: null,
  rankInterval: null,
  probabilityBest: null,
  activationEnergyJPerMol: null,
  activationEnergyInterval: null,
  lnPreExponential: null,
  lnPreExponentialInterval: null,
  rateMolPerKgS: null,
  rateInterval: null,
  turnoverFrequencyPerS: null,
  turnoverFrequencyInterval: null,
  temperatureForConversionK: null,
  temperatureForConversionInterval: null,
  selectivity: {},
  selectivityIntervals: {},
  carbonBalance: null,
  carbonBalanceInterval: null,
  decayPerH: null,
  decayInterval: null,
  cannotTell: {},
  distinctTemperatures: 0,
  lowestTemperatureK: null,
  highestTemperatureK: null,
  fit: null,
  runFits: [],
  workings: {},
} as const

/** Numbers of a row that may be missing, by the name of their field. */
const COMPUTED = [
  'rank',
  'activationEnergyJPerMol',
  'lnPreExponential',
  'rateMolPerKgS',
  'turnoverFrequencyPerS',
  'temperatureForConversionK',
  'selectivity',
  'carbonBalance',
  'decayPerH',
] as const

/** Why a row has no number at all. */
function whyNothing(runs: readonly RankingRun[], noLine: string): string {
  if (runs.length === 0) return 'no run of this sample yet.'
  const reasons = runs.filter((run) => !run.isIncluded).map((run) => `${run.code}: ${run.reason.replace(/\.$/, '')}`)
  return `${[...reasons, ...(noLine === '' ? [] : [noLine.replace(/\.$/, '')])].join('; ')}.`
}

/** What the line and the figures beside it cannot say, by field. */
function cannotTellOf(
  numbers: SampleNumbers,
  figures: ReturnType<typeof rowFigures>,
  rankedBy: MethodSettings['rankedBy'],
): Record<string, string> {
  const { fit } = numbers
  const found: Record<string, string> = {}
  const noScatter = `${fit.distinctTemperatures} temperatures leave no scatter to judge the line by; three or more are needed.`
  if (fit.activationEnergyJPerMol.randomStandardUncertainty === null)
    for (const name of [
      'rank',
      'activationEnergyJPerMol',
      'lnPreExponential',
      'rateMolPerKgS',
      'turnoverFrequencyPerS',
    ])
      found[name] = noScatter
  if (fit.isReferenceExtrapolated)
    found['rank'] = 'the reference temperature lies outside the measured range, where a line says nothing to rank by.'
  if (numbers.lnTurnover === null) {
    found['turnoverFrequencyPerS'] = 'no site count for this sample.'
    if (rankedBy === 'turnover-frequency') found['rank'] = found['turnoverFrequencyPerS']
  }
  if (figures.noSelectivity !== '') found['selectivity'] = figures.noSelectivity
  for (const [name, entry] of [
    ['temperatureForConversionK', figures.temperatureForConversionK],
    ['carbonBalance', figures.carbonBalance],
    ['decayPerH', figures.decayPerH],
    ...Object.entries(figures.selectivity).map(([species, entry]) => [`selectivity.${species}`, entry] as const),
  ] as const)
    if (entry.cannotTell !== '') found[name] = entry.cannotTell
  return found
}

/** Same doubt of several runs once; notes stay on the run's own page. */
function rowCautions(
  included: readonly ReducedRun[],
  leftOut: readonly ReducedRun[],
  own: readonly Caution[],
): Caution[] {
  const found: Caution[] = [...own]
  for (const { reduction, run } of included)
    if (reduction !== null)
      for (const caution of allCautions(reduction))
        if (caution.severity !== 'note')
          found.push(
            included.length > 1
              ? { ...caution, tag: `${run.code}: ${caution.tag}`, sentence: `${run.code}: ${caution.sentence}` }
              : caution,
          )
  for (const { reduction, run } of leftOut)
    if (reduction !== null)
      for (const caution of allCautions(reduction))
        if (!mayCountWith([caution]))
          found.push({ ...caution, tag: `${run.code}: ${caution.tag}`, sentence: `${run.code}: ${caution.sentence}` })
  const seen = new Set<string>()
  return found.filter((caution) => {
    const key = `${caution.code} ${caution.tag}`
    if (seen.has(key)) return false
    seen.add(key)
    return true
  })
}

interface Prepared {
  readonly row: RankingRow
  readonly numbers: SampleNumbers | null
  readonly merit: Estimate | null
}

function prepareSample(sample: CampaignSample, request: RankingRequest): Prepared {
  const { settings, referenceTemperatureK, includeProvisional } = request
  const entries = request.runs.filter((entry) => entry.run.sampleId === sample.sampleId)
  const runs = entries.map((entry) => rankingRun(entry, includeProvisional))
  const included = entries.filter((_, index) => runs[index]?.isIncluded === true)
  const leftOut = entries.filter((_, index) => runs[index]?.isIncluded !== true)
  const head = {
    sampleId: sample.sampleId,
    sampleCode: sample.sampleCode,
    sampleName: sample.sampleName,
    kind:
      entries.length > 0 && entries.every((entry) => entry.run.kind !== 'catalyst')
        ? ('blank' as const)
        : ('catalyst' as const),
    runs,
    isProvisional: included.some((entry) => entry.run.decision !== 'counts'),
    isShortlisted: sample.isShortlisted,
    priority: sample.priority,
    remark: sample.remark,
    version: sample.version,
  }
  const reductions = included.flatMap((entry) => (entry.reduction === null ? [] : [entry.reduction]))
  const nothing = (noLine: string): Prepared => ({
    row: {
      ...head,
      ...emptyNumbers,
      cannotTell: Object.fromEntries(COMPUTED.map((name) => [name, whyNothing(runs, noLine)])),
      cautions: rowCautions(included, leftOut, []),
    },
    numbers: null,
    merit: null,
  })
  if (reductions.length === 0) return nothing('')
  let fit: ArrheniusFit
  try {
    fit = fitArrhenius({
      quantity: 'rate',
      points: reductions.flatMap(linePoints),
      referenceTemperatureK,
      confidenceLevel: settings.confidenceLevel,
      subject: sample.sampleCode,
      betweenRunVariance: settings.betweenLoadingRate * settings.betweenLoadingRate,
    })
  } catch (error) {
    if (error instanceof AnalysisError) return nothing(error.message)
    throw error
  }
  const loadingCount = new Set(included.map((entry) => entry.run.loadingId)).size
  const perBed = 1 / Math.sqrt(loadingCount)
  const lnRate = withBetweenLoading(fit.lnRateAtReference, settings.betweenLoadingRate * perBed)
  const sites = included.find((entry) => entry.siteCount !== null)?.siteCount ?? null
  const numbers: SampleNumbers = {
    fit,
    lnRate,
    lnTurnover: sites === null ? null : lnPerSite(lnRate, sites),
    activationEnergy: withBetweenLoading(
      fit.activationEnergyJPerMol,
      settings.betweenLoadingActivationEnergy * fit.activationEnergyJPerMol.value * perBed,
    ),
    lnPreExponential: withBetweenLoading(fit.lnPreExponential, settings.betweenLoadingRate * perBed),
    loadingCount,
  }
  const level = settings.confidenceLevel
  const figures = rowFigures({ sampleCode: sample.sampleCode, runs: reductions, loadingCount, settings })
  const intervalIn = (estimate: Estimate | null) => (estimate === null ? null : intervalOf(estimate, level))
  const selectivity = Object.fromEntries(
    Object.entries(figures.selectivity).flatMap(([name, { estimate }]) =>
      estimate === null ? [] : [[name, estimate]],
    ),
  )
  const own: Caution[] = [
    ...(sites === null && settings.rankedBy === 'turnover-frequency'
      ? [raiseCaution('no-site-count', { value: null, limit: null })]
      : []),
    ...(reductions.length > 1 ? fit.cautions.filter((caution) => caution.severity !== 'note') : []),
    ...(reductions.length === 1 && fit.isReferenceExtrapolated
      ? fit.cautions.filter((caution) => caution.code === 'reference-extrapolated')
      : []),
  ]
  const lnMerit = settings.rankedBy === 'rate' ? numbers.lnRate : numbers.lnTurnover
  const rateAtReference = exponential(numbers.lnRate)
  const row: RankingRow = {
    ...head,
    ...emptyNumbers,
    activationEnergyJPerMol: numbers.activationEnergy,
    activationEnergyInterval: intervalOf(numbers.activationEnergy, level),
    lnPreExponential: numbers.lnPreExponential,
    lnPreExponentialInterval: intervalOf(numbers.lnPreExponential, level),
    rateMolPerKgS: rateAtReference,
    rateInterval: expInterval(numbers.lnRate, level),
    turnoverFrequencyPerS: numbers.lnTurnover === null ? null : exponential(numbers.lnTurnover),
    turnoverFrequencyInterval: numbers.lnTurnover === null ? null : expInterval(numbers.lnTurnover, level),
    temperatureForConversionK: figures.temperatureForConversionK.estimate,
    temperatureForConversionInterval: intervalIn(figures.temperatureForConversionK.estimate),
    selectivity,
    selectivityIntervals: Object.fromEntries(
      Object.entries(selectivity).map(([name, estimate]) => [name, intervalIn(estimate)]),
    ),
    carbonBalance: figures.carbonBalance.estimate,
    carbonBalanceInterval: intervalIn(figures.carbonBalance.estimate),
    decayPerH: figures.decayPerH.estimate,
    decayInterval: intervalIn(figures.decayPerH.estimate),
    cannotTell: cannotTellOf(numbers, figures, settings.rankedBy),
    distinctTemperatures: fit.distinctTemperatures,
    lowestTemperatureK: fit.lowestTemperatureK,
    highestTemperatureK: fit.highestTemperatureK,
    cautions: rowCautions(included, leftOut, own),
    fit,
    runFits: reductions.length > 1 ? reductions.flatMap((reduction) => reduction.fit ?? []) : [],
    workings: {
      ...rowWorkings(sample.sampleCode, numbers, sites, settings, lossSentences(reductions)),
      temperatureForConversionK: figures.temperatureForConversionK.working,
      ...Object.fromEntries(
        Object.entries(figures.selectivity).map(([name, entry]) => [`selectivity.${name}`, entry.working]),
      ),
      carbonBalance: figures.carbonBalance.working,
      decayPerH: figures.decayPerH.working,
    },
  }
  // outside its own range a line says nothing to rank by
  const mayRank = lnMerit !== null && lnMerit.randomStandardUncertainty !== null && !fit.isReferenceExtrapolated
  return { row, numbers, merit: mayRank ? lnMerit : null }
}

const ratioText = (value: number) => (value >= 10 ? String(Math.round(value)) : value.toFixed(2))

/** One sentence that says what the ranks mean. */
function summaryOf(ranks: RankResult, codeOf: (id: string) => string, celsius: string, figure: string): string {
  if (ranks.samples.length === 0)
    return 'Nothing can be ranked yet: a sample needs a run with a line and its uncertainty.'
  const first = ranks.samples[0]
  if (ranks.samples.length === 1 || first === undefined)
    return `${first === undefined ? '' : codeOf(first.id)} stands alone: a ranking needs two samples.`
  const close = ranks.neighbours.filter(({ ratioInterval }) => ratioInterval[0] < 1 && ratioInterval[1] > 1)
  const lead =
    first.probabilityBest >= 0.95
      ? `${codeOf(first.id)} has the highest ${figure} at ${celsius} (probability ${first.probabilityBest > 0.99 ? 'above 0.99' : first.probabilityBest.toFixed(2)}).`
      : `No sample is the best beyond doubt; ${codeOf(first.id)} leads with probability ${first.probabilityBest.toFixed(2)}.`
  if (close.length === 0) return `${lead} Every sample is told apart from its neighbour in the ranking at ${celsius}.`
  const pairs = close.map(
    ({ betterId, worseId, ratio, ratioInterval }) =>
      `${codeOf(betterId)} and ${codeOf(worseId)} (ratio ${ratioText(ratio)}, ${ratioText(ratioInterval[0])} to ${ratioText(ratioInterval[1])})`,
  )
  return `${lead} Cannot be told apart at ${celsius}: ${pairs.join('; ')}.`
}

/** Rows of the ranking, ranked ones first, and the sentence that goes with them. Same input, same bits. */
export function rankingRows(request: RankingRequest): { rows: RankingRow[]; summary: string } {
  const prepared = request.samples.map((sample) => prepareSample(sample, request))
  const perBed = (entry: Prepared) => (entry.numbers === null ? 0 : 1 / Math.sqrt(entry.numbers.loadingCount))
  const ranks = rankSamples(
    prepared.flatMap((entry) =>
      entry.merit === null || entry.numbers === null
        ? []
        : [
            {
              id: entry.row.sampleId,
              lnMerit: {
                ...entry.merit,
                // the spread between beds is drawn apart, so that it is not widened by the line's few degrees of freedom
                randomStandardUncertainty: entry.numbers.fit.lnRateAtReference.randomStandardUncertainty,
                degreesOfFreedom: entry.numbers.fit.lnRateAtReference.degreesOfFreedom,
              },
              betweenLoadingStandardDeviation: request.settings.betweenLoadingRate * perBed(entry),
            },
          ],
    ),
    { draws: request.settings.draws, seed: request.settings.seed },
  )
  const rankOf = new Map(ranks.samples.map((sample) => [sample.id, sample]))
  const rows = prepared
    .map(({ row }): RankingRow => {
      const found = rankOf.get(row.sampleId)
      return found === undefined
        ? row
        : { ...row, rank: found.rank, rankInterval: found.rankInterval, probabilityBest: found.probabilityBest }
    })
    .sort(
      (a, b) =>
        (a.rank ?? Infinity) - (b.rank ?? Infinity) ||
        (a.sampleCode < b.sampleCode ? -1 : a.sampleCode > b.sampleCode ? 1 : 0),
    )
  const codeOf = (id: string) => request.samples.find((sample) => sample.sampleId === id)?.sampleCode ?? id
  const celsius = `${Math.round((request.referenceTemperatureK - 273.15) * 10) / 10} °C`
  const figure = request.settings.rankedBy === 'rate' ? 'rate per mass' : 'turnover frequency'
  return { rows, summary: summaryOf(ranks, codeOf, celsius, figure) }
}
