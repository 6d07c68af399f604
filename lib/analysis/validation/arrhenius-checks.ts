import ln from '@stdlib/math-base-special-ln'
import { fitEyring } from '../kinetics/eyring'
import { fitNonlinearArrhenius } from '../kinetics/nonlinear-arrhenius'
import { fitYorkLine } from '../kinetics/york-line'
import { compareLines } from '../comparison/compare-lines'
import { pointwiseBand, predictionBand, workingHotellingBand } from '../statistics/bands'
import { fitQuadratic } from '../statistics/quadratic'
import { diagnoseResiduals } from '../statistics/residuals'
import { coverageFactor, twoSidedTProbability } from '../statistics/student-t'
import { fitWeightedLine } from '../statistics/weighted-line'
import { testDifference } from '../statistics/welch'
import { GAS_CONSTANT_J_PER_MOL_K as R } from '../units/constants'
import { type Check, type CheckItem, ITERATED, item, once } from './check'

/** The references were computed with R = 8.314462618, two digits short of the exact constant. */
const SHORT_R = 2e-8

interface RateSet {
  readonly t: readonly number[]
  readonly k: readonly number[]
  readonly weights?: readonly number[]
}

const line = ({ t, k, weights }: RateSet) =>
  once(() =>
    fitWeightedLine(
      t.map((value) => 1 / value),
      k.map((value) => ln(value)),
      weights ?? null,
    ),
  )

const energyItems = (set: RateSet, expected: { ea: number; se: number; lnA: number; lnASe: number }): CheckItem[] => {
  const fit = line(set)
  return [
    item('activation energy', 'J/mol', expected.ea, () => -R * fit().slope, SHORT_R),
    item('its standard error', 'J/mol', expected.se, () => R * (fit().scaled?.slope ?? NaN), SHORT_R),
    item('ln A', '1', expected.lnA, () => fit().intercept, SHORT_R),
    item('its standard error', '1', expected.lnASe, () => fit().scaled?.intercept, SHORT_R),
  ]
}

const curvatureP = (set: RateSet) => () => {
  const parabola = fitQuadratic(
    set.t.map((value) => 1 / value),
    set.k.map((value) => ln(value)),
    null,
  )
  const straight = line(set)().residualSumOfSquares
  if (parabola === null) return null
  // one extra term: the t test of the curvature is the root of its F
  const t = Math.sqrt(
    (straight - parabola.residualSumOfSquares) / (parabola.residualSumOfSquares / parabola.degreesOfFreedom),
  )
  return twoSidedTProbability(t, parabola.degreesOfFreedom)
}

const iodide: RateSet = { t: [555, 575, 645, 700, 781], k: [3.52e-7, 1.22e-6, 8.59e-5, 1.16e-3, 3.95e-2] }
const acetaldehyde: RateSet = {
  t: [700, 730, 760, 790, 810, 840, 910, 1_000],
  k: [0.011, 0.035, 0.105, 0.343, 0.789, 2.17, 20, 145],
}
const five: RateSet = { t: acetaldehyde.t.slice(0, 5), k: acetaldehyde.k.slice(0, 5) }
const known = [0.1, 0.08, 0.06, 0.05, 0.05, 0.05, 0.04, 0.04]
const weighted: RateSet = { ...acetaldehyde, weights: known.map((sigma) => 1 / (sigma * sigma)) }
const engel: RateSet = { t: [22.7, 27.2, 33.7, 38].map((c) => c + 273.15), k: [7e-4, 9.8e-4, 1.6e-3, 2e-3] }
const diazonium: RateSet = { t: [313, 319, 323, 328, 333], k: [0.00043, 0.00103, 0.0018, 0.00355, 0.00717] }
const pentoxide: RateSet = { t: [273, 293, 313, 333, 353], k: [0.0787, 1.7, 25.7, 178, 2_140].map((k) => k * 1e-5) }
const pentoxideAgain: RateSet = { t: [338, 318, 298], k: [4.9e-3, 5e-4, 3.5e-5] }

const twoPoints = (cold: number, kCold: number, hot: number, kHot: number) =>
  -R * line({ t: [cold, hot], k: [kCold, kHot] })().slope
const at650 = 1 / 650
const points = ({ t, k }: RateSet) => ({ x: t.map((value) => 1 / value), y: k.map((value) => ln(value)) })
const comparison = once(() => compareLines([points(pentoxide), points(pentoxideAgain)]))
const slopePart = (set: RateSet) => {
  const fit = line(set)()
  return {
    value: -R * fit.slope,
    standardUncertainty: R * (fit.scaled?.slope ?? NaN),
    degreesOfFreedom: fit.degreesOfFreedom,
  }
}
const welch = once(() => testDifference(slopePart(pentoxide), slopePart(pentoxideAgain)))
const inK = once(() => fitNonlinearArrhenius(acetaldehyde.t, acetaldehyde.k))
const eyring = once(() => fitEyring(iodide.t, iodide.k))
const york = once(() => {
  const x = [0, 0.9, 1.8, 2.6, 3.3, 4.4, 5.2, 6.1, 6.5, 7.4]
  const y = [5.9, 5.4, 4.4, 4.6, 3.5, 3.7, 2.8, 2.8, 2.4, 1.5]
  const wx = [1_000, 1_000, 500, 800, 200, 80, 60, 20, 1.8, 1]
  const wy = [1, 1.8, 4, 8, 20, 20, 70, 70, 100, 500]
  return fitYorkLine(
    x.map((value, i) => ({
      x: value,
      y: y[i] ?? NaN,
      standardUncertaintyX: 1 / Math.sqrt(wx[i] ?? NaN),
      standardUncertaintyY: 1 / Math.sqrt(wy[i] ?? NaN),
    })),
  )
})

/** Checks of Arrhenius lines and their kin. */
export const ARRHENIUS_CHECKS: readonly Check[] = [
  {
    id: 'C01',
    title: 'Hydrogen iodide decomposition, 5 temperatures',
    source: 'OpenStax, Chemistry 2e, section 12.5',
    provenance: 'read',
    published:
      '180 kJ/mol, from the two end points with 1/T rounded to three digits; the end points unrounded give 185.43',
    items: [
      ...energyItems(iodide, { ea: 185307.855312, se: 2177.390722, lnA: 25.2038224577, lnASe: 0.411660416836 }),
      item(
        'covariance of ln A and Ea',
        'J/mol',
        889.569548761,
        () => -R * (line(iodide)().scaled?.interceptSlopeCovariance ?? NaN),
        SHORT_R,
      ),
      item('harmonic mean temperature', 'K', 641.000905526, () => 1 / line(iodide)().centreX),
      item('ln k there', '1', -9.5658821941, () => line(iodide)().centreValue),
      item('its standard error', '1', 0.0505221111511, () => line(iodide)().scaled?.centreValue),
      item('residual standard deviation', '1', 0.112970874901, () => line(iodide)().residualStandardDeviation),
      item('R²', '1', 0.999585975077, () => line(iodide)().rSquared),
      item('ln k at 650 K', '1', -9.08450395259, () => pointwiseBand(line(iodide)(), at650, 0.95).value),
      item(
        'standard error there',
        '1',
        0.0508377511093,
        () => pointwiseBand(line(iodide)(), at650, 0.95).standardError,
      ),
      item(
        'lower end of ln k at 650 K',
        '1',
        ln(9.64686603311e-5),
        () => pointwiseBand(line(iodide)(), at650, 0.95).low,
      ),
      item(
        'upper end, for the whole line',
        '1',
        ln(1.41628859622e-4),
        () => workingHotellingBand(line(iodide)(), at650, 0.95).high,
      ),
      item(
        'lower end, for a new value',
        '1',
        ln(7.64591737677e-5),
        () => predictionBand(line(iodide)(), at650, 0.95).low,
      ),
      item('leverage of the fifth point', '1', 0.620244928489, () => line(iodide)().leverage[4]),
      item(
        'externally studentised residual of the fifth',
        '1',
        2.22330632432,
        () => diagnoseResiduals(line(iodide)()).externallyStudentised[4],
      ),
      item('Cook distance of the fifth', '1', 1.74420146569, () => diagnoseResiduals(line(iodide)()).cookDistance[4]),
      item('p of the curvature', '1', 0.224888263024, curvatureP(iodide)),
      item('activation enthalpy', 'J/mol', 179894.302006, () => eyring().activationEnthalpyJPerMol, SHORT_R),
      item(
        'activation entropy, 1 mol/L',
        'J/(mol K)',
        -50.2423070817,
        () => eyring().activationEntropyJPerMolK,
        SHORT_R,
      ),
    ],
  },
  {
    id: 'C02',
    title: 'Two points',
    source: 'OpenStax, Chemistry 2e, section 12.5',
    provenance: 'read',
    published: '1.1e5 J/mol; two points have no standard error, and none is given',
    items: [
      item('1.66 at 650 K, 7.39 at 700 K', 'J/mol', 112986.248598, () => twoPoints(650, 1.66, 700, 7.39), SHORT_R),
      item('0.011 at 703 K, 4.95 at 865 K', 'J/mol', 190668.22723, () => twoPoints(703, 0.011, 865, 4.95), SHORT_R),
    ],
  },
  {
    id: 'C03',
    title: 'Acetaldehyde decomposition, 8 temperatures',
    source: 'Atkins, Elements of Physical Chemistry',
    provenance: 'read',
    published: '188 kJ/mol, A = 1.08e12',
    items: [
      ...energyItems(acetaldehyde, { ea: 188328.774068, se: 2834.6093394, lnA: 27.7071142295, lnASe: 0.424447099857 }),
      item(
        'lower end of Ea',
        'J/mol',
        181392.734882,
        () => {
          const fit = line(acetaldehyde)()
          return -R * fit.slope - coverageFactor(0.95, 6) * R * (fit.scaled?.slope ?? NaN)
        },
        SHORT_R,
      ),
      item('residual standard deviation', '1', 0.127011627785, () => line(acetaldehyde)().residualStandardDeviation),
      item('leverage of the eighth point', '1', 0.533113826324, () => line(acetaldehyde)().leverage[7]),
      item(
        'Cook distance of the first',
        '1',
        0.635483732816,
        () => diagnoseResiduals(line(acetaldehyde)()).cookDistance[0],
      ),
      item('externally studentised residual of the seventh', '1', 2.0339417546, () =>
        Math.abs(diagnoseResiduals(line(acetaldehyde)()).externallyStudentised[6] ?? NaN),
      ),
      item('p of the curvature', '1', 0.72245487433, curvatureP(acetaldehyde)),
    ],
  },
  {
    id: 'C04',
    title: 'The same, first 5 temperatures: a bend that R² hides',
    source: 'Chang, Chemistry, example 13.8',
    provenance: 'read',
    published: '179.7 kJ/mol, 1/T rounded to five decimals',
    items: [
      ...energyItems(five, { ea: 181927.699833, se: 6066.79307566, lnA: 26.6620930983, lnASe: 0.966643276302 }),
      item('R²', '1', 0.996674970412, () => line(five)().rSquared),
      item('p of the curvature', '1', 0.0338318449726, curvatureP(five)),
      item('Cook distance of the first', '1', 1.58746172964, () => diagnoseResiduals(line(five)()).cookDistance[0]),
    ],
  },
  {
    id: 'C06',
    title: 'Temperatures given in degrees Celsius',
    source: 'Engel and Reid, Physical Chemistry, example 18.8',
    provenance: 'read',
    published: '53.37 kJ/mol, 1.88e6 s⁻¹ (R = 8.314)',
    items: [
      item('activation energy', 'J/mol', 53376.8825154, () => -R * line(engel)().slope, SHORT_R),
      item('its standard error', 'J/mol', 2229.00049127, () => R * (line(engel)().scaled?.slope ?? NaN), SHORT_R),
      item('ln A', '1', 14.4456977106, () => line(engel)().intercept),
      item('ln k at 298.15 K', '1', -7.08629412263, () => pointwiseBand(line(engel)(), 1 / 298.15, 0.95).value),
    ],
  },
  {
    id: 'C08',
    title: 'Benzenediazonium chloride',
    source: 'Fogler, Elements of Chemical Reaction Engineering, example 3-1',
    provenance: 'recalled',
    published: '116.5 to 120 kJ/mol by edition, read from a graph',
    items: [
      item('activation energy', 'J/mol', 121488.269044, () => -R * line(diazonium)().slope, SHORT_R),
      item('its standard error', 'J/mol', 838.601753758, () => R * (line(diazonium)().scaled?.slope ?? NaN), SHORT_R),
      item('externally studentised residual of the fifth', '1', 8.19102068757, () =>
        Math.abs(diagnoseResiduals(line(diazonium)()).externallyStudentised[4] ?? NaN),
      ),
    ],
  },
  {
    id: 'C10',
    title: 'Weights from stated relative errors',
    source: 'data of C03 with chosen errors; R 4.2.2 lm',
    provenance: 'computed',
    published: 'the stated errors are too small by a factor of 2.5: both standard errors are shown',
    items: [
      item('activation energy', 'J/mol', 189519.726413, () => -R * line(weighted)().slope, SHORT_R),
      item('χ²', '1', 37.204724488, () => line(weighted)().residualSumOfSquares),
      item(
        'standard error from the stated errors',
        'J/mol',
        1233.46750369,
        () => R * line(weighted)().unscaled.slope,
        SHORT_R,
      ),
      item(
        'standard error scaled by the scatter',
        'J/mol',
        3071.50434124,
        () => R * (line(weighted)().scaled?.slope ?? NaN),
        SHORT_R,
      ),
      item('weighted harmonic mean temperature', 'K', 850.015898743, () => 1 / line(weighted)().centreX),
    ],
  },
  {
    id: 'C11',
    title: 'The same data fitted in k without weights',
    source: 'data of C03; R 4.2.2 nls',
    provenance: 'computed',
    published: 'a wrong error model moves Ea by 20 kJ/mol, seven of its own standard errors',
    items: [
      item('activation energy', 'J/mol', 168178.9862932, () => inK().activationEnergyJPerMol, ITERATED),
      item('its standard error', 'J/mol', 1914.37012148, () => inK().activationEnergyStandardError, ITERATED),
      item('ln k at the harmonic mean temperature', '1', 0.1628444707197, () => inK().lnRateAtCentre, ITERATED),
      item('residual sum of squares', '1', 1.322601952162, () => inK().fit.residualSumOfSquares, ITERATED),
    ],
  },
  {
    id: 'C12',
    title: 'Equal slopes: dinitrogen pentoxide from two books',
    source: 'NCERT, Chemistry; Zumdahl, Chemistry, exercise 67',
    provenance: 'read',
    published: 'no comparison is printed',
    items: [
      item(
        'residual sum of squares, one line',
        '1',
        0.156643175894,
        () => comparison().commonLine.residualSumOfSquares,
      ),
      item('parallel lines', '1', 0.121419000136, () => comparison().commonSlope.residualSumOfSquares),
      item('separate lines', '1', 0.113538251811, () => comparison().separate.residualSumOfSquares),
      item('F of equal slopes', '1', 0.277642052771, () => comparison().equalSlopes.f),
      item('p of equal slopes', '1', 0.626119761242, () => comparison().equalSlopes.pValue),
      item('p of equal levels', '1', 0.282339985272, () => comparison().equalLevels.pValue),
      item('difference of the activation energies', 'J/mol', -2857.21214058, () => welch().difference, SHORT_R),
      item('Welch degrees of freedom', '1', 3.54804907899, () => welch().degreesOfFreedom),
      item('p of the difference', '1', 0.337801877665, () => welch().pValue),
    ],
  },
  {
    id: 'C13',
    title: 'Errors in both variables',
    source: 'Pearson 1901 with the weights of York 1966; York et al., Am. J. Phys. 72 (2004) 367',
    provenance: 'read',
    published: '5.479910224 and −0.480533407, standard errors 0.294970735 and 0.0579850090',
    items: [
      item('intercept', '1', 5.479910224033, () => york().intercept, 1e-11),
      item('slope', '1', -0.4805334074462, () => york().slope, 1e-11),
      item('internal standard error of the intercept', '1', 0.2949707354931, () => york().internal.intercept, 1e-9),
      item('internal standard error of the slope', '1', 0.05798500900077, () => york().internal.slope, 1e-9),
      item('external standard error of the slope', '1', 0.0706202695288, () => york().external?.slope, 1e-9),
      item('χ²/ν', '1', 1.483294149258, () => york().reducedChiSquared, 1e-10),
    ],
  },
]
