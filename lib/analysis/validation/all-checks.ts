import { ARRHENIUS_CHECKS } from './arrhenius-checks'
import { type Check } from './check'
import { EQUILIBRIUM_CHECKS } from './equilibrium-checks'
import { REACTOR_CHECKS } from './reactor-checks'
import { STATISTICS_CHECKS } from './statistics-checks'
import { TRANSPORT_CHECKS } from './transport-checks'

/** Every check of the engine against numbers made elsewhere, in the order of their numbers. */
export const ALL_CHECKS: readonly Check[] = [
  ...ARRHENIUS_CHECKS,
  ...STATISTICS_CHECKS,
  ...EQUILIBRIUM_CHECKS,
  ...REACTOR_CHECKS,
  ...TRANSPORT_CHECKS,
].toSorted((a, b) => (a.id < b.id ? -1 : a.id > b.id ? 1 : 0))
