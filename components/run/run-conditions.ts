import { GAS_CONSTANT_J_PER_MOL_K } from '@/lib/analysis/units/constants'
import { type FeedEntry, type Run } from '@/lib/domain/run'
import { setFigures } from '@/lib/domain/format-estimate'
import { formatInstant } from '@/lib/domain/format-instant'

const M3_PER_S_TO_ML_PER_MIN = 6e7

/** At most four figures, no trailing zeros. */
const short = (value: number) => setFigures(String(Number(value.toPrecision(4))))

/** The whole feed as a volume at the state its parts were stated at; null where they were stated at different ones. */
export function totalFlowText(feed: readonly FeedEntry[]): string | null {
  const first = feed[0]
  if (!first) return null
  const isOneState = feed.every(
    (entry) =>
      entry.referenceTemperatureK === first.referenceTemperatureK &&
      entry.referencePressurePa === first.referencePressurePa,
  )
  const totalMolPerS = feed.reduce((sum, entry) => sum + entry.flowMolPerS, 0)
  if (!isOneState) return `${short(totalMolPerS * 1e6)} µmol s⁻¹`
  const volumeM3PerS =
    (totalMolPerS * GAS_CONSTANT_J_PER_MOL_K * first.referenceTemperatureK) / first.referencePressurePa
  const state = `${short(first.referenceTemperatureK - 273.15)} °C, ${setFigures(String(Number((first.referencePressurePa / 1_000).toPrecision(6))))} kPa`
  return `${short(volumeM3PerS * M3_PER_S_TO_ML_PER_MIN)} mL min⁻¹ (${state})`
}

/** Gauge pressures are shown as what they are, with the barometer where it is known. */
function pressureText(run: Run): string | null {
  if (run.pressurePa === null) return null
  const bar = `${short(run.pressurePa / 1e5)} bar`
  if (run.pressureKind === 'absolute') return `${bar} abs`
  return run.barometerPa === null ? `${bar} gauge` : `${bar} gauge, barometer ${short(run.barometerPa / 1e5)} bar`
}

function bedText(run: Run): string {
  const { catalystMassKg, diluentMassKg, diluentMaterial } = run.loading
  const catalyst = `${short(catalystMassKg * 1e6)} mg`
  if (!(diluentMassKg > 0)) return catalyst
  return `${catalyst} in ${short(diluentMassKg * 1e6)} mg${diluentMaterial === '' ? ' diluent' : ` ${diluentMaterial}`}`
}

/** Where, when and how the run was made, on one line. */
export function runConditions(run: Run, timeZone: string): string {
  return [
    run.channel === '' ? run.rigCode : `${run.rigCode}, channel ${run.channel}`,
    `${formatInstant(run.startedAt, timeZone)} ${timeZone}`,
    bedText(run),
    totalFlowText(run.feed),
    pressureText(run),
  ]
    .filter((part) => part !== null && part !== '')
    .join(' · ')
}
