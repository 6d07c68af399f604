import exp from '@stdlib/math-base-special-exp'
import { adjustByHolm } from '../comparison/holm'
import { fTest } from '../comparison/compare-lines'
import { compareAllPairs } from '../comparison/tukey-kramer'
import { fitLangmuirHinshelwood } from '../kinetics/langmuir-hinshelwood'
import { fitNonlinear, type NonlinearModel } from '../kinetics/levenberg-marquardt'
import { fitLinearModel } from '../kinetics/linear-model'
import { workingHotellingBand } from '../statistics/bands'
import { testLackOfFit } from '../statistics/lack-of-fit'
import { fitQuadratic } from '../statistics/quadratic'
import { diagnoseResiduals } from '../statistics/residuals'
import { fitWeightedLine } from '../statistics/weighted-line'
import { testDifference } from '../statistics/welch'
import { type Check, ITERATED, item, once } from './check'
import { ANSCOMBE, LONGLEY, NORRIS, PENTANE, PLANT_GROWTH, PONTIUS, PUROMYCIN, TOLUCA, TOLUENE } from './reference-data'

const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
const squares = (values: readonly number[]) => {
  const centre = mean(values)
  return values.reduce((sum, value) => sum + (value - centre) * (value - centre), 0)
}

const norris = once(() => fitWeightedLine(NORRIS.x, NORRIS.y, null))
const pontius = once(() => fitWeightedLine(PONTIUS.x, PONTIUS.y, null))
const pontiusTest = once(() => testLackOfFit(PONTIUS.x, PONTIUS.y, pontius().fitted, 2))
const parabola = once(() => fitQuadratic(PONTIUS.x, PONTIUS.y, null))
const longley = once(() => fitLinearModel(LONGLEY.rows, LONGLEY.y))
const toluca = once(() => fitWeightedLine(TOLUCA.x, TOLUCA.y, null))
const anscombe = ANSCOMBE.map(({ x, y }) => once(() => fitWeightedLine(x, y, null)))
const largest = (values: readonly (number | null)[] | undefined) =>
  Math.max(...(values ?? []).map((value) => Math.abs(value ?? 0)))

const pairs = once(() => {
  const freedom = PLANT_GROWTH.reduce((sum, group) => sum + group.length - 1, 0)
  const s = Math.sqrt(PLANT_GROWTH.reduce((sum, group) => sum + squares(group), 0) / freedom)
  return compareAllPairs(
    PLANT_GROWTH.map((group) => ({ mean: mean(group), count: group.length })),
    s,
    freedom,
  )
})
const welch = once(() => {
  const part = (values: readonly number[]) => ({
    value: mean(values),
    standardUncertainty: Math.sqrt(squares(values) / (values.length - 1) / values.length),
    degreesOfFreedom: values.length - 1,
  })
  return testDifference(part(PLANT_GROWTH[1] ?? []), part(PLANT_GROWTH[2] ?? []))
})
const holm = once(() => adjustByHolm([0.01, 0.04, 0.03, 0.005]))

const approach = (x: readonly number[]): NonlinearModel => ({
  values: ([b1 = NaN, b2 = NaN]) => x.map((value) => b1 * (1 - exp(-b2 * value))),
})
const misra = once(() =>
  fitNonlinear(
    approach([77.6, 114.9, 141.1, 190.8, 239.9, 289, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760]),
    [10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.4, 75.47, 81.78],
    [500, 1e-4],
  ),
)
const box = once(() => fitNonlinear(approach([1, 2, 3, 5, 7, 10]), [109, 149, 149, 191, 213, 224], [100, 0.75]))
const pentane = once(() =>
  fitNonlinear(
    {
      values: ([k = NaN, kh = NaN, kp = NaN, ki = NaN]) =>
        PENTANE.map(({ h, p, i }) => (k * kp * (p - i / 1.632)) / (1 + kh * h + kp * p + ki * i)),
    },
    PENTANE.map(({ r }) => r),
    [35, 0.1, 0.05, 0.2],
  ),
)
const toluene = once(() =>
  fitLangmuirHinshelwood(TOLUENE, {
    drivingOrders: { T: 1, H2: 1 },
    adsorbed: ['B', 'T'],
    denominatorPower: 1,
    equilibrium: null,
  }),
)
const saturation = (concentrations: readonly number[]): NonlinearModel => ({
  values: ([v = NaN, k = NaN]) => concentrations.map((c) => (v * c) / (k + c)),
})
const treated = once(() => fitNonlinear(saturation(PUROMYCIN.treated.c), PUROMYCIN.treated.r, [200, 0.1]))
const untreated = once(() => fitNonlinear(saturation(PUROMYCIN.untreated.c), PUROMYCIN.untreated.r, [160, 0.05]))
const together = once(() =>
  fitNonlinear(
    {
      values: ([v = NaN, d = NaN, k = NaN]) => [
        ...PUROMYCIN.untreated.c.map((c) => (v * c) / (k + c)),
        ...PUROMYCIN.treated.c.map((c) => ((v + d) * c) / (k + c)),
      ],
    },
    [...PUROMYCIN.untreated.r, ...PUROMYCIN.treated.r],
    [160, 40, 0.05],
  ),
)
const commonConstant = once(() =>
  fTest(together(), {
    residualSumOfSquares: treated().residualSumOfSquares + untreated().residualSumOfSquares,
    degreesOfFreedom: treated().degreesOfFreedom + untreated().degreesOfFreedom,
  }),
)

/** Checks of the statistics under the kinetics. */
export const STATISTICS_CHECKS: readonly Check[] = [
  {
    id: 'C14',
    title: 'Norris, straight line',
    source: 'NIST Statistical Reference Datasets',
    provenance: 'read',
    published: 'certified values',
    items: [
      item('intercept', '1', -0.262323073774029, () => norris().intercept),
      item('its standard error', '1', 0.232818234301152, () => norris().scaled?.intercept),
      item('slope', '1', 1.00211681802045, () => norris().slope),
      item('its standard error', '1', 0.429796848199937e-3, () => norris().scaled?.slope),
      item('residual standard deviation', '1', 0.884796396144373, () => norris().residualStandardDeviation),
      item('R²', '1', 0.999993745883712, () => norris().rSquared),
    ],
  },
  {
    id: 'C15',
    title: 'Pontius: a line with R² = 0.99999 that does not fit',
    source: 'NIST Statistical Reference Datasets; NIST/SEMATECH e-Handbook 4.6.1.5',
    provenance: 'read',
    published: 'lack-of-fit F 214.7464; the handbook computes in single precision',
    items: [
      item('intercept', '1', 6.14968421053e-3, () => pontius().intercept),
      item('slope', '1', 7.22102581454e-7, () => pontius().slope),
      item('lack-of-fit F', '1', 214.746923654, () => pontiusTest()?.f),
      item('its p', '1', 5.50371738e-19, () => pontiusTest()?.pValue, 1e-7),
      item('square term of the parabola', '1', -0.316081871345029e-14, () => parabola()?.curvature),
    ],
  },
  {
    id: 'C17',
    title: 'Longley, six nearly dependent columns',
    source: 'NIST Statistical Reference Datasets',
    provenance: 'recalled',
    published: 'certified values',
    items: [
      ...[
        -3482258.63459582, 15.0618722713733, -0.035819179292591, -2.02022980381683, -1.03322686717359,
        -0.0511041056535807, 1829.15146461355,
      ].map((expected, j) => item(`coefficient ${String(j)}`, '1', expected, () => longley().coefficients[j], 1e-7)),
      ...[
        890420.383607373, 84.9149257747669, 0.0334910077722432, 0.488399681651699, 0.214274163161675, 0.22607320006937,
        455.478499142212,
      ].map((expected, j) =>
        item(`standard error ${String(j)}`, '1', expected, () => longley().standardErrors[j], 1e-7),
      ),
      item('residual standard deviation', '1', 304.854073561965, () => longley().residualStandardDeviation, 1e-7),
    ],
  },
  {
    id: 'C19',
    title: 'Working-Hotelling band, the Toluca company',
    source: 'Kutner et al., Applied Linear Statistical Models',
    provenance: 'recalled',
    published: '131.2 to 207.8, 272.0 to 316.8, 387.2 to 451.6',
    items: [
      item('lower end at 30', 'h', 131.154187595, () => workingHotellingBand(toluca(), 30, 0.9).low),
      item('upper end at 65', 'h', 316.82291553, () => workingHotellingBand(toluca(), 65, 0.9).high),
      item('upper end at 100', 'h', 451.613023772, () => workingHotellingBand(toluca(), 100, 0.9).high),
    ],
  },
  {
    id: 'C20',
    title: 'All pairs of three groups: Tukey and Welch',
    source: 'R data set PlantGrowth',
    provenance: 'recalled',
    published: 'p 0.3908711, 0.1979960, 0.0120064',
    items: [
      item('p of the first pair', '1', 0.3908711442, () => pairs()[0]?.pValue, ITERATED),
      item('p of the second pair', '1', 0.1979959913, () => pairs()[1]?.pValue, ITERATED),
      item('p of the third pair', '1', 0.012006424, () => pairs()[2]?.pValue, ITERATED),
      item('upper end of the first difference', 'g', 1.06221605141, () => pairs()[0]?.high, ITERATED),
      item('Welch degrees of freedom', '1', 14.1035691228, () => welch().degreesOfFreedom),
      item('Welch p', '1', 0.00929840471727, () => welch().pValue),
    ],
  },
  {
    id: 'C21',
    title: 'Holm step-down',
    source: 'Holm, Scand. J. Stat. 6 (1979) 65',
    provenance: 'computed',
    published: '0.01, 0.04, 0.03, 0.005 become 0.03, 0.06, 0.06, 0.02',
    items: [0.03, 0.06, 0.06, 0.02].map((expected, i) =>
      item(`p ${String(i + 1)}`, '1', expected, () => holm()[i], 1e-12),
    ),
  },
  {
    id: 'C22',
    title: 'Anscombe: four sets of one R²',
    source: 'Anscombe, Am. Stat. 27 (1973) 17',
    provenance: 'recalled',
    published: 'R² 0.67 and slope 0.5 for all four',
    items: [
      ...[0.500090909091, 0.5, 0.499727272727, 0.499909090909].map((expected, i) =>
        item(`slope of set ${String(i + 1)}`, '1', expected, () => anscombe[i]?.().slope),
      ),
      item(
        'largest studentised residual of set 3',
        '1',
        1203.53946383,
        () => {
          const third = anscombe[2]
          return third === undefined ? null : largest(diagnoseResiduals(third()).externallyStudentised)
        },
        ITERATED,
      ),
      item('largest leverage of set 4', '1', 1, () => largest(anscombe[3]?.().leverage)),
    ],
  },
  {
    id: 'C24',
    title: 'Misra1a',
    source: 'NIST Statistical Reference Datasets',
    provenance: 'read',
    published: 'certified values',
    items: [
      item('b1', '1', 238.9421291789, () => misra().parameters[0], ITERATED),
      item('its standard error', '1', 2.70700752414, () => misra().standardErrors[0], ITERATED),
      item('b2', '1', 5.501564318059e-4, () => misra().parameters[1], ITERATED),
      item('its standard error', '1', 7.26686884362e-6, () => misra().standardErrors[1], ITERATED),
      item('residual sum of squares', '1', 0.1245513889444, () => misra().residualSumOfSquares, ITERATED),
    ],
  },
  {
    id: 'C26',
    title: 'BoxBOD, first-order approach in 6 points',
    source: 'NIST Statistical Reference Datasets',
    provenance: 'recalled',
    published: 'certified values',
    items: [
      item('b1', '1', 213.8094088904, () => box().parameters[0], ITERATED),
      item('its standard error', '1', 12.3545151765, () => box().standardErrors[0], ITERATED),
      item('b2', '1', 0.5472374854192, () => box().parameters[1], ITERATED),
      item('its standard error', '1', 0.10455993237, () => box().standardErrors[1], ITERATED),
    ],
  },
  {
    id: 'C27',
    title: 'n-Pentane isomerisation, saturation law',
    source: 'Carr 1960; Bates and Watts, Nonlinear Regression Analysis, 1988',
    provenance: 'read',
    published: '35.92, 0.0708, 0.0377, 0.167; residual sum of squares 3.234',
    items: [
      ...[35.92022305898, 0.07084331355079, 0.0377299645598, 0.1671347444319].map((expected, j) =>
        item(
          ['k', 'K of hydrogen', 'K of pentane', 'K of isopentane'][j] ?? '',
          '1',
          expected,
          () => pentane().parameters[j],
          ITERATED,
        ),
      ),
      item('residual sum of squares', '1', 3.234482275391, () => pentane().residualSumOfSquares, ITERATED),
      item('correlation of the first two K', '1', 0.99782988, () => pentane().correlation?.[1]?.[2], ITERATED),
    ],
  },
  {
    id: 'C29',
    title: 'Toluene hydrodemethylation, saturation law',
    source: 'Fogler, Elements of Chemical Reaction Engineering',
    provenance: 'recalled',
    published: '1.45e-8, 1.39, 1.038; the linearised fit is biased and not reproduced',
    items: [
      item('k', '1e-10 mol/(g s atm²)', 144.7673078288, () => toluene().constants[0]?.value, ITERATED),
      item('K of benzene', '1/atm', 1.390526433642, () => toluene().constants[1]?.value, ITERATED),
      item('K of toluene', '1/atm', 1.038410557951, () => toluene().constants[2]?.value, ITERATED),
      item('residual sum of squares', '1', 3.260509018741, () => toluene().residualSumOfSquares, ITERATED),
    ],
  },
  {
    id: 'C30',
    title: 'Saturation kinetics in two states',
    source: 'R data set Puromycin; Bates and Watts, Nonlinear Regression Analysis, 1988',
    provenance: 'recalled',
    published: '212.7 and 0.0641, standard errors 6.95 and 0.00828',
    items: [
      item('largest rate, treated', '1', 212.6837431425, () => treated().parameters[0], ITERATED),
      item('its standard error', '1', 6.94715516004, () => treated().standardErrors[0], ITERATED),
      item('constant, treated', '1', 0.06412128168157, () => treated().parameters[1], ITERATED),
      item('constant, untreated', '1', 0.047708184494, () => untreated().parameters[1], ITERATED),
      item('F of a common constant', '1', 1.71816887, () => commonConstant().f, ITERATED),
      item('its p', '1', 0.205552272, () => commonConstant().pValue, ITERATED),
    ],
  },
]
