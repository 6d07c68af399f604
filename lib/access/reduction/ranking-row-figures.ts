import 'server-only'
import { intervalSentence } from '../../analysis/arrhenius/arrhenius-workings'
import { type Estimate } from '../../analysis/estimate'
import {
  selectivityAtConversion,
  temperatureAtConversion,
  type BetweenHolds,
} from '../../analysis/ranking/at-conversion'
import { meanOfEstimates } from '../../analysis/ranking/mean-of-estimates'
import { lossOfReturnedHold } from '../../analysis/reduction/returned-hold'
import { type Point, type RunReduction } from '../../analysis/reduction/run-reduction'
import { intervalOf } from '../../analysis/total-uncertainty'
import { type Working, type WorkingSymbol } from '../../analysis/working'
import { estimateSymbol, plainSymbol } from '../../analysis/working-symbols'
import { type MethodSettings } from '../../domain/method'
import { withBetweenLoading } from './between-loading'

/** A number of the row, how it came about, and what it cannot say. */
interface Figure {
  readonly estimate: Estimate | null
  readonly working: Working
  /** why there is no number, or no uncertainty; empty when both are there */
  readonly cannotTell: string
}

/** Numbers of a row that do not come from the line. */
export interface RowFigures {
  readonly temperatureForConversionK: Figure
  /** by species */
  readonly selectivity: Readonly<Record<string, Figure>>
  /** why no species has one; empty where one has */
  readonly noSelectivity: string
  readonly carbonBalance: Figure
  readonly decayPerH: Figure
}

export interface FigureRequest {
  readonly sampleCode: string
  readonly runs: readonly RunReduction[]
  readonly loadingCount: number
  readonly settings: MethodSettings
}

const UNKNOWN_SCATTER =
  'its scatter is not known: no hold has two injections that can be compared, or a line has no uncertainty.'
const SOURCE_OF_MEAN = 'R. DerSimonian, N. Laird, Control. Clin. Trials 7 (1986) 177, unweighted'
const meanNote = (count: number): string[] =>
  count > 1
    ? [
        `Mean of ${count} runs: where they differ by more than their own uncertainties explain, that is in the uncertainty (${SOURCE_OF_MEAN}).`,
      ]
    : []
const percentText = (share: number) => `${Math.round(share * 1e5) / 1e3} %`

/** Points of a run that its line is drawn through. */
function usedPoints(reduction: RunReduction): Point[] {
  const used = new Set((reduction.fit?.points ?? []).filter((point) => point.isUsed).map((point) => point.holdNumber))
  return reduction.points.filter((point) => used.has(point.hold.number))
}

/** In what the working states the number, and how sure its interval is. */
interface Stated {
  readonly level: number
  readonly factor: number
  readonly offset?: number
  readonly unit: string
}

function figure(estimate: Estimate | null, noNumber: string, derived: Working, stated: Stated): Figure {
  const interval = estimate === null ? null : intervalOf(estimate, stated.level)
  const { factor, offset = 0, unit, level } = stated
  const working =
    interval === null
      ? derived
      : {
          ...derived,
          notes: [
            intervalSentence([interval[0] * factor + offset, interval[1] * factor + offset], level, 1, unit),
            ...derived.notes,
          ],
        }
  const cannotTell = estimate === null ? noNumber : estimate.randomStandardUncertainty === null ? UNKNOWN_SCATTER : ''
  return {
    estimate,
    cannotTell,
    working: cannotTell === '' ? working : { ...working, notes: [`Cannot tell: ${cannotTell}`, ...working.notes] },
  }
}

/** What a run's holds span, said where the target lies outside. */
function notEnclosed({ runCode }: RunReduction, points: readonly Point[], target: number): string {
  const seen = points.flatMap((point) => point.conversion?.value ?? [])
  const range =
    seen.length === 0
      ? 'no hold in its line has a conversion'
      : `its line was measured from ${percentText(Math.min(...seen))} to ${percentText(Math.max(...seen))}`
  return `no two neighbouring holds of ${runCode} enclose a conversion of ${percentText(target)}: ${range}`
}

const conversionSymbols = (runCode: string, points: readonly Point[], holds: BetweenHolds['holdNumbers']) =>
  holds.flatMap((number, side) => {
    const point = points.find((candidate) => candidate.hold.number === number)
    if (point === undefined) return []
    const index = side + 1
    return [
      estimateSymbol(`X_${index}`, `conversion, ${runCode}, hold ${number}`, point.conversion, '%', 100),
      estimateSymbol(`T_${index}`, `bed, ${runCode}, hold ${number}`, point.temperatureK, '°C', 1, -273.15),
    ]
  })

function temperatureFigure({ sampleCode, runs, loadingCount, settings }: FigureRequest): Figure {
  const target = settings.targetConversion
  const found = runs.map((run) => {
    const points = usedPoints(run)
    return { run, points, at: temperatureAtConversion(points, target) }
  })
  const inside = found.flatMap(({ run, points, at }) => (at === null ? [] : [{ run, points, at }]))
  const leftOut = found.flatMap(({ run, points, at }) => (at === null ? [notEnclosed(run, points, target)] : []))
  let slope = 0
  for (const { at } of inside) slope += Math.abs(at.perLnConversionK) / inside.length
  const spread = settings.betweenLoadingRate * slope
  const mean = meanOfEstimates(
    inside.map(({ at }) => at.estimate),
    { hasPooledScatter: false, expectedSpread: loadingCount > 1 ? spread : 0 },
  )
  const estimate = mean === null ? null : withBetweenLoading(mean, spread / Math.sqrt(loadingCount))
  return figure(
    estimate,
    `${leftOut.join('; ')}.`,
    {
      title: `Temperature at which ${sampleCode} converts ${percentText(target)}`,
      formula: '1/T = 1/T_1 + (ln X − ln X_1)/(ln X_2 − ln X_1) · (1/T_2 − 1/T_1)',
      symbols: [
        plainSymbol('X', 'target conversion of the method', target * 100, '%'),
        ...inside.flatMap(({ run, points, at }) => conversionSymbols(run.runCode, points, at.holdNumbers)),
      ],
      result: estimateSymbol('T', 'temperature, at the run’s own contact time', estimate, '°C', 1, -273.15),
      assumptions: [
        'Between the two neighbouring holds ln X is straight in 1/T; nothing is said outside the measured range.',
      ],
      source: 'JCGM 100:2008, 5.1.2 and 5.2.2 (propagation); interpolation: common practice',
      from: inside.map(({ run, at }) => `${run.runCode}: holds ${at.holdNumbers[0]} and ${at.holdNumbers[1]}`),
      leftOut,
      notes: [
        ...(estimate === null
          ? []
          : [
              `Spread between packed beds, ${percentText(settings.betweenLoadingRate)} of the rate a bed over ${loadingCount} bed${loadingCount === 1 ? '' : 's'}, is in the uncertainty: at this contact time conversion goes with the rate, and the factor e in it is worth ${(Math.round(slope * 10) / 10).toFixed(1)} K.`,
            ]),
        ...meanNote(inside.length),
      ],
    },
    { level: settings.confidenceLevel, factor: 1, offset: -273.15, unit: '°C' },
  )
}

function selectivityFigures({ sampleCode, runs, settings }: FigureRequest): {
  readonly bySpecies: Record<string, Figure>
  readonly none: string
} {
  const target = settings.targetConversion
  const found = runs.map((run) => {
    const points = usedPoints(run)
    return { run, points, at: selectivityAtConversion(points, target) }
  })
  const species = [...new Set(found.flatMap(({ at }) => Object.keys(at)))].sort()
  const bySpecies: Record<string, Figure> = {}
  for (const name of species) {
    const inside = found.flatMap(({ run, points, at }) => {
      const here = at[name]
      return here === undefined ? [] : [{ run, points, here }]
    })
    const estimate = meanOfEstimates(
      inside.map(({ here }) => here.estimate),
      { hasPooledScatter: false },
    )
    bySpecies[name] = figure(
      estimate,
      '',
      {
        title: `Selectivity of ${sampleCode} to ${name} at ${percentText(target)} conversion`,
        formula: 'S = S_1 + (X − X_1)/(X_2 − X_1) · (S_2 − S_1)',
        symbols: [
          plainSymbol('X', 'target conversion of the method', target * 100, '%'),
          ...inside.flatMap(({ run, points, here }) =>
            here.holdNumbers.flatMap((number, side): WorkingSymbol[] => {
              const point = points.find((candidate) => candidate.hold.number === number)
              if (point === undefined) return []
              const where = `${run.runCode}, hold ${number}`
              const index = side + 1
              return [
                estimateSymbol(`X_${index}`, `conversion, ${where}`, point.conversion, '%', 100),
                estimateSymbol(
                  `S_${index}`,
                  `selectivity, ${where}`,
                  point.carbonSelectivity[name] ?? null,
                  'C-mol %',
                  100,
                ),
              ]
            }),
          ),
        ],
        result: estimateSymbol('S', `share of the converted carbon found as ${name}`, estimate, 'C-mol %', 100),
        assumptions: [
          'At equal conversion for all samples, by a straight line between the two neighbouring holds; nothing is said outside the measured range.',
          'The scatter of S and of X is taken as independent.',
        ],
        source: 'JCGM 100:2008, 5.1.2 and 5.2.2 (propagation); comparison at equal conversion: common practice',
        from: inside.map(({ run, here }) => `${run.runCode}: holds ${here.holdNumbers[0]} and ${here.holdNumbers[1]}`),
        leftOut: found.flatMap(({ run, points, at }) =>
          at[name] === undefined ? [notEnclosed(run, points, target)] : [],
        ),
        notes: meanNote(inside.length),
      },
      { level: settings.confidenceLevel, factor: 100, unit: 'C-mol %' },
    )
  }
  return {
    bySpecies,
    none: species.length > 0 ? '' : `${found.map(({ run, points }) => notEnclosed(run, points, target)).join('; ')}.`,
  }
}

/** Balance of one run: mean of its holds but for those that a person left out. */
function balanceOfRun(run: RunReduction): { readonly estimate: Estimate | null; readonly holds: readonly number[] } {
  const points = run.points.filter(
    (point) => point.carbonBalance !== null && (point.excluded === null || point.excluded.by === 'rule'),
  )
  return {
    estimate: meanOfEstimates(
      points.flatMap((point) => point.carbonBalance ?? []),
      { hasPooledScatter: true },
    ),
    holds: points.map((point) => point.hold.number),
  }
}

function carbonFigure({ sampleCode, runs, settings }: FigureRequest): Figure {
  const found = runs.map((run) => ({ run, ...balanceOfRun(run) }))
  const inside = found.flatMap(({ run, estimate, holds }) => (estimate === null ? [] : [{ run, estimate, holds }]))
  const leftOut = found.flatMap(({ run, estimate }) =>
    estimate === null
      ? [`${run.runCode} has none: without an internal standard the analysis makes the balance close by itself`]
      : [],
  )
  const estimate = meanOfEstimates(
    inside.map((entry) => entry.estimate),
    { hasPooledScatter: false },
  )
  return figure(
    estimate,
    `${leftOut.join('; ')}.`,
    {
      title: `Carbon balance of ${sampleCode}`,
      formula: 'B_C = Σ n_C F_out / Σ n_C F_in',
      symbols: inside.map(({ run, estimate: ofRun, holds }) =>
        estimateSymbol('B_C', `${run.runCode}, mean of ${holds.length} holds`, ofRun, ''),
      ),
      result: estimateSymbol('B_C', 'mean of the runs in the line', estimate, ''),
      assumptions: [
        'Holds have the same weight; how they differ among each other is in the uncertainty where it is more than the scatter of injections explains.',
      ],
      source: `JCGM 100:2008, 5.2.2 (shared response factors and inlet); ${SOURCE_OF_MEAN} (mean)`,
      from: inside.map(({ run, holds }) => `${run.runCode}: holds ${holds.join(', ')}`),
      leftOut,
      notes: meanNote(inside.length),
    },
    { level: settings.confidenceLevel, factor: 1, unit: 'mol/mol' },
  )
}

function decayFigure({ sampleCode, runs, settings }: FigureRequest): Figure {
  const found = runs.map((run) => ({
    run,
    returned: run.returnedHold,
    loss:
      run.returnedHold === null
        ? null
        : lossOfReturnedHold(run.points, run.returnedHold, run.fit?.activationEnergyJPerMol ?? null),
  }))
  const inside = found.flatMap(({ run, returned, loss }) =>
    returned === null || loss === null ? [] : [{ run, returned, loss }],
  )
  const leftOut = found.flatMap(({ run, loss }) =>
    loss === null ? [`no hold of ${run.runCode} returns to earlier conditions`] : [],
  )
  const estimate = meanOfEstimates(
    inside.map(({ loss }) => loss.lossPerH),
    { hasPooledScatter: false },
  )
  return figure(
    estimate,
    `${leftOut.join('; ')}.`,
    {
      title: `Loss of activity of ${sampleCode}`,
      formula: 'k_d = −ln(r_returned / r_first) / Δt',
      symbols: inside.flatMap(({ run, returned, loss }) => [
        estimateSymbol(
          'r_returned / r_first',
          `${run.runCode}, hold ${returned.holdNumber} against hold ${returned.returnsTo}, at one temperature`,
          returned.ratio,
          '',
        ),
        plainSymbol('Δt', `${run.runCode}, time between the two`, loss.hours, 'h'),
      ]),
      result: estimateSymbol(
        'k_d',
        'loss per hour on stream; below zero it became more active',
        estimate,
        '% h⁻¹',
        100,
      ),
      assumptions: [
        'A first-order loss between the two holds. Errors that both share cancel; the scatter of both rates and of both temperatures remains.',
      ],
      source: 'O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 21; JCGM 100:2008, 5.1.2',
      from: inside.map(({ run, returned }) => `${run.runCode}: holds ${returned.returnsTo} and ${returned.holdNumber}`),
      leftOut,
      notes: meanNote(inside.length),
    },
    { level: settings.confidenceLevel, factor: 100, unit: '% h⁻¹' },
  )
}

/** Temperature and selectivity at the target conversion, carbon balance and loss on stream of a sample, each with its uncertainty in parts. */
export function rowFigures(request: FigureRequest): RowFigures {
  const selectivity = selectivityFigures(request)
  return {
    temperatureForConversionK: temperatureFigure(request),
    selectivity: selectivity.bySpecies,
    noSelectivity: selectivity.none,
    carbonBalance: carbonFigure(request),
    decayPerH: decayFigure(request),
  }
}
