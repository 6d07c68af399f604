import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { coverageFactor } from '../statistics/student-t'
import { fitWeightedLine } from '../statistics/weighted-line'

/** One sample of a series that differs only in site density. */
export interface SiteSeriesPoint {
  readonly sitesMolPerKg: number
  readonly rateMolPerKgS: number
}

/** What the series says about transport. */
export interface SiteSeriesTest {
  readonly slope: number
  readonly standardError: number | null
  readonly interval: readonly [number, number] | null
  readonly span: number
  readonly verdict:
    'no-limitation-seen' | 'internal-limitation' | 'external-limitation' | 'some-limitation' | 'cannot-tell'
  readonly sentence: string
}

/** Factor by which the site density should differ. Source: Madon and Boudart 1982. */
export const SITE_SPAN = 10

/**
 * Test for transport limitation from samples of different site density at one temperature and composition.
 *
 * slope of ln r against ln n_s: 1 without limitation, ½ with pore diffusion in control, 0 with the film in control
 *
 * Same support, particle size and, as far as possible, dispersion. Repeat at a second temperature: only then heat effects show.
 * Source: Koros and Nowak, Chem. Eng. Sci. 22 (1967) 470; Madon and Boudart, Ind. Eng. Chem. Fundam. 21 (1982) 438.
 *
 * @param points - at least 2 samples: sites [mol kg-1] > 0, rate [mol kg-1 s-1] > 0
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns slope with interval [-]; n − 2 degrees of freedom
 * @throws {AnalysisError} too-few-points | not-positive | as the line fit
 */
export function testSiteSeries(points: readonly SiteSeriesPoint[], confidenceLevel = 0.95): SiteSeriesTest {
  if (points.length < 2) throw new AnalysisError('too-few-points', 'The test needs at least two samples.')
  if (points.some(({ sitesMolPerKg, rateMolPerKgS }) => !(sitesMolPerKg > 0) || !(rateMolPerKgS > 0)))
    throw new AnalysisError('not-positive', 'Sites and rates must be above zero.')
  const line = fitWeightedLine(
    points.map(({ sitesMolPerKg }) => ln(sitesMolPerKg)),
    points.map(({ rateMolPerKgS }) => ln(rateMolPerKgS)),
    null,
  )
  const sites = points.map(({ sitesMolPerKg }) => sitesMolPerKg)
  const span = Math.max(...sites) / Math.min(...sites)
  const error = line.scaled?.slope ?? null
  const reach = error === null ? null : coverageFactor(confidenceLevel, line.degreesOfFreedom) * error
  const interval = reach === null ? null : ([line.slope - reach, line.slope + reach] as const)
  const verdict = verdictOf(interval)
  return { slope: line.slope, standardError: error, interval, span, verdict, sentence: sentenceOf(verdict, span) }
}

function verdictOf(interval: readonly [number, number] | null): SiteSeriesTest['verdict'] {
  if (interval === null) return 'cannot-tell'
  const holds = (value: number) => interval[0] <= value && value <= interval[1]
  if (holds(1)) return holds(0.5) ? 'cannot-tell' : 'no-limitation-seen'
  if (holds(0.5)) return holds(0) ? 'cannot-tell' : 'internal-limitation'
  if (holds(0)) return 'external-limitation'
  return 'some-limitation'
}

function sentenceOf(verdict: SiteSeriesTest['verdict'], span: number): string {
  const words = {
    'no-limitation-seen': 'The rate follows the number of sites: no transport limitation is seen.',
    'internal-limitation': 'The rate follows the root of the number of sites, as pore diffusion makes it.',
    'external-limitation': 'The rate does not follow the number of sites, as the film around the particles makes it.',
    'some-limitation': 'The rate does not rise in proportion to the sites: transport takes part, or the sites differ.',
    'cannot-tell': 'The series cannot tell: more samples or a wider range of site densities are needed.',
  }
  const narrow =
    span < SITE_SPAN
      ? ` The site densities span a factor of ${span.toPrecision(2)}; ${String(SITE_SPAN)} or more is wanted.`
      : ''
  return `${words[verdict]}${narrow}`
}
