import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { equilibriumQuotient } from '../equilibrium/approach-to-equilibrium'
import { type Species, type Stoichiometry } from './run-input'

/** One reaction of the bed with its conversion of the key reactant. */
export interface BedStep {
  readonly stoichiometry: Stoichiometry
  /** orders in partial pressure; all taken as zero where empty */
  readonly orders: Readonly<Record<Species, number>>
  /** part of the key reactant that this step has used up at the outlet */
  readonly conversion: number
  /** ln K; null leaves the reverse reaction out */
  readonly lnEquilibrium: number | null
}

export interface BedRequest {
  readonly keyReactant: Species
  readonly inletMoleFraction: Readonly<Record<Species, number>>
  readonly pressurePa: number
  readonly steps: readonly BedStep[]
}

export interface BedSolution {
  /** rate of each step at feed composition, as conversion per whole bed: r W / F_A0 */
  readonly forwardRates: readonly number[]
  /** their sum */
  readonly total: number
}

interface PreparedStep {
  /** change of each species' flow per mole of key reactant converted by this step */
  readonly change: Float64Array
  readonly numbers: readonly number[]
  readonly orders: readonly { readonly index: number; readonly order: number; readonly inlet: number }[]
  readonly equilibriumConstant: number | null
}

interface PreparedBed {
  readonly inlet: Float64Array
  readonly keyFlow: number
  readonly pressurePa: number
  readonly steps: readonly PreparedStep[]
  /** partial pressures at the place in the bed that is being looked at, written anew for each: some thousands of places a point */
  readonly pressures: Float64Array
}

const INTEGRATION_STEPS = 24
const TOLERANCE = 1e-11

function prepareBed(request: BedRequest): PreparedBed {
  const names = new Set(Object.keys(request.inletMoleFraction))
  for (const step of request.steps) for (const name of Object.keys(step.stoichiometry)) names.add(name)
  const species = [...names].sort()
  const inlet = Float64Array.from(species, (name) => request.inletMoleFraction[name] ?? 0)
  const keyFlow = request.inletMoleFraction[request.keyReactant] ?? 0
  if (!(keyFlow > 0)) {
    throw new AnalysisError('missing-input', `The feed holds no ${request.keyReactant}.`, {
      species: request.keyReactant,
    })
  }
  const steps = request.steps.map((step): PreparedStep => {
    const consumed = -(step.stoichiometry[request.keyReactant] ?? 0)
    if (!(consumed > 0)) {
      throw new AnalysisError('missing-input', `A step of the reaction does not consume ${request.keyReactant}.`, {})
    }
    const numbers = species.map((name) => step.stoichiometry[name] ?? 0)
    const orders = Object.keys(step.orders)
      .sort()
      .flatMap((name) => {
        const order = step.orders[name] ?? 0
        if (order === 0) return []
        const index = species.indexOf(name)
        const fraction = inlet[index] ?? 0
        if (!(fraction > 0)) {
          throw new AnalysisError(
            'missing-input',
            `The rate law has an order in ${name}, of which the feed holds none: the rate at feed composition is not defined.`,
            { species: name },
          )
        }
        return [{ index, order, inlet: fraction * request.pressurePa }]
      })
    return {
      change: Float64Array.from(numbers, (nu) => nu / consumed),
      numbers,
      orders,
      equilibriumConstant: step.lnEquilibrium === null ? null : exp(step.lnEquilibrium),
    }
  })
  return { inlet, keyFlow, pressurePa: request.pressurePa, steps, pressures: new Float64Array(species.length) }
}

function fillPressures(bed: PreparedBed, conversions: Float64Array): void {
  const { inlet, keyFlow, pressurePa, steps, pressures } = bed
  let total = 0
  for (let i = 0; i < inlet.length; i++) {
    let flow = inlet[i] ?? 0
    for (let s = 0; s < steps.length; s++) flow += keyFlow * (conversions[s] ?? 0) * (steps[s]?.change[i] ?? 0)
    pressures[i] = flow
    total += flow
  }
  for (let i = 0; i < pressures.length; i++) pressures[i] = (pressurePa * (pressures[i] ?? 0)) / total
}

// Rate of one step relative to its forward rate in the feed, at the pressures of the bed.
function relativeRate(step: PreparedStep, pressures: Float64Array): number {
  let rate = 1
  for (const { index, order, inlet } of step.orders) {
    const pressure = pressures[index] ?? 0
    if (!(pressure > 0)) return Number.NaN
    rate *= pow(pressure / inlet, order)
  }
  if (step.equilibriumConstant === null) return rate
  return rate * (1 - equilibriumQuotient(step.numbers, pressures, step.equilibriumConstant))
}

// dX/dz of every step at given conversions and forward rates
function fillSlopes(bed: PreparedBed, conversions: Float64Array, rates: readonly number[], slopes: Float64Array): void {
  fillPressures(bed, conversions)
  for (let s = 0; s < slopes.length; s++) {
    const step = bed.steps[s]
    slopes[s] = step === undefined ? Number.NaN : relativeRate(step, bed.pressures) * (rates[s] ?? 0)
  }
}

function move(from: Float64Array, by: Float64Array, factor: number, to: Float64Array): void {
  for (let s = 0; s < to.length; s++) to[s] = (from[s] ?? 0) + factor * (by[s] ?? 0)
}

// Conversions at the outlet for given forward rates: classical fourth-order Runge-Kutta with fixed steps, the same every time
function integrate(bed: PreparedBed, rates: readonly number[]): Float64Array {
  const h = 1 / INTEGRATION_STEPS
  const zeros = (): Float64Array => new Float64Array(rates.length)
  const [conversions, place, k1, k2, k3, k4] = [zeros(), zeros(), zeros(), zeros(), zeros(), zeros()]
  for (let i = 0; i < INTEGRATION_STEPS; i++) {
    fillSlopes(bed, conversions, rates, k1)
    move(conversions, k1, h / 2, place)
    fillSlopes(bed, place, rates, k2)
    move(conversions, k2, h / 2, place)
    fillSlopes(bed, place, rates, k3)
    move(conversions, k3, h, place)
    fillSlopes(bed, place, rates, k4)
    for (let s = 0; s < conversions.length; s++)
      conversions[s] =
        (conversions[s] ?? 0) + (h / 6) * ((k1[s] ?? 0) + 2 * (k2[s] ?? 0) + 2 * (k3[s] ?? 0) + (k4[s] ?? 0))
  }
  return conversions
}

/**
 * Forward rates at feed composition that give the observed conversions at the outlet of a plug-flow bed.
 *
 * dX_s/dz = R_s prod_i (p_i / p_i0)^a_si (1 - Q_s / K_s), z from 0 to 1 along the catalyst mass, R_s = r_s W / F_A0;
 * F_i = F_i0 + F_A0 sum_s X_s nu_si / abs(nu_sA), p_i = P F_i / sum F: the change of the number of moles is followed, the pressure is constant.
 * Isothermal, isobaric, no axial mixing; steps in parallel, each with a power law and its own approach to equilibrium.
 * R_s is found by R_s := R_s X_s / X_s(R), which contracts with the conversion itself, accelerated in ln R where it is slow.
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapters 5 and 18; G. F. Froment, K. B. Bischoff, J. De Wilde, Chemical
 * Reactor Analysis and Design, 3rd edition, 2011, section 9.3.
 *
 * @param request - feed, pressure [Pa] and steps with orders and conversions [-]; conversions are zero or more and add up to less than 1
 * @returns rate of each step and their sum as conversion per bed; multiply by F_A0 / W for a rate per mass [-]
 * @throws {AnalysisError} missing-input | out-of-range | no-convergence
 */
export function solvePlugFlowBed(request: BedRequest): BedSolution {
  const bed = prepareBed(request)
  const target = request.steps.map((step) => step.conversion)
  let sum = 0
  for (const conversion of target) {
    if (!(conversion >= 0))
      throw new AnalysisError('out-of-range', 'A conversion in the bed is below zero.', { target })
    sum += conversion
  }
  if (!(sum < 1)) throw new AnalysisError('out-of-range', `A bed cannot convert ${sum} of its feed.`, { target })
  let rates = [...target]
  // differences of ln X from its target, of this and the last round, for the secant in ln R of each step
  let lastError: number[] | null = null
  let lastStep: number[] = target.map(() => 0)
  for (let round = 0; round < 100; round++) {
    const reached = integrate(bed, rates)
    if (reached.some((value) => !Number.isFinite(value))) break
    let worst = 0
    const error = Array.from(reached, (value, s) => {
      const wanted = target[s] ?? 0
      if (wanted === 0) return 0
      const difference = ln(wanted) - ln(Math.max(value, wanted * 1e-6))
      worst = Math.max(worst, Math.abs(difference))
      return difference
    })
    if (worst < TOLERANCE) {
      let total = 0
      for (const rate of rates) total += rate
      return { forwardRates: rates, total }
    }
    const step = error.map((difference, s) => {
      const before = lastError?.[s]
      const moved = lastStep[s] ?? 0
      if (before === undefined || round % 2 === 1 || moved === 0) return difference
      const gain = (before - difference) / moved
      // the secant only where it is sane: rates rise with conversion, a gain between 0.05 and 1.5
      return gain > 0.05 && gain < 1.5 ? difference / gain : difference
    })
    rates = rates.map((rate, s) => rate * exp(Math.max(-2, Math.min(2, step[s] ?? 0))))
    lastError = error
    lastStep = step
  }
  throw new AnalysisError(
    'no-convergence',
    'No forward rate gives this conversion: it lies at or beyond equilibrium, or the rate law runs out of a reactant.',
    { target },
  )
}
