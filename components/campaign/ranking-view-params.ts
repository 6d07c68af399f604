import { type RankingView } from '@/components/server-state/ranking'

/** The view of a ranking as the address holds it: `at` in °C, `provisional=0` to leave undecided runs out. */
export function rankingViewFromParams(parameters: { get(name: string): string | null }): RankingView {
  const at = parameters.get('at')
  const celsius = at === null || at.trim() === '' ? NaN : Number(at)
  const isTemperature = Number.isFinite(celsius) && celsius > -200 && celsius < 2_000
  return {
    // rounded so that the same degree is the same view, whichever way it was reached
    referenceTemperatureK: isTemperature ? Math.round((celsius + 273.15) * 100) / 100 : null,
    includeProvisional: parameters.get('provisional') !== '0',
  }
}

/** The same parameters with this view put in. */
export function paramsWithRankingView(parameters: URLSearchParams, view: RankingView): URLSearchParams {
  const next = new URLSearchParams(parameters)
  if (view.referenceTemperatureK === null) next.delete('at')
  else next.set('at', String(Math.round((view.referenceTemperatureK - 273.15) * 100) / 100))
  if (view.includeProvisional) next.delete('provisional')
  else next.set('provisional', '0')
  return next
}
