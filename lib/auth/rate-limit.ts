import 'server-only'
import { isIP } from 'node:net'
import { RateLimiterMemory } from 'rate-limiter-flexible'
import { AppError } from '../domain/errors'
import { environment } from '../environment'

/** Bursts from one address, or against one name; what has to survive a restart is counted in the database. */
const budgets = {
  /** sign-ins, set-up codes and invitations tried from one address */
  'sign-in-address': { points: 30, durationS: 300 },
  /** the same for a network that hides behind many addresses */
  'sign-in-network': { points: 120, durationS: 300 },
  /** passwords tried for a person from a device that has signed that person in before */
  'sign-in-device': { points: 10, durationS: 900 },
} as const
export type Budget = keyof typeof budgets

const LIMITERS = Symbol.for('inverse-kelvin.rate-limiters')

function limiter(name: Budget): RateLimiterMemory {
  const holder: typeof globalThis & { [LIMITERS]?: Map<Budget, RateLimiterMemory> } = globalThis
  const limiters = (holder[LIMITERS] ??= new Map())
  let one = limiters.get(name)
  if (one === undefined) {
    one = new RateLimiterMemory({ points: budgets[name].points, duration: budgets[name].durationS })
    limiters.set(name, one)
  }
  return one
}

/** What every refused attempt hears, whoever it was and however it was found. */
export function tooManyAttempts(retryAfterS: number): AppError {
  const seconds = Math.max(1, Math.ceil(retryAfterS))
  const wait = seconds < 90 ? `${seconds} s` : `${Math.ceil(seconds / 60)} minutes`
  return new AppError(
    'too-many-requests',
    `Too many attempts. Try again in ${wait}, or ask an admin for a new invitation.`,
    {
      retryAfterS: seconds,
    },
  )
}

/** Takes one from the budget of a key, or throws with the time to wait. */
export async function takeFromBudget(name: Budget, key: string): Promise<void> {
  try {
    await limiter(name).consume(key)
  } catch (refusal) {
    // Not by its class: bundled, the package is there twice, once as what we import and once as what it imports itself.
    if (typeof refusal === 'object' && refusal !== null && 'msBeforeNext' in refusal)
      throw tooManyAttempts(Number(refusal.msBeforeNext) / 1000)
    throw refusal
  }
}

/** Gives one back: a success costs nothing, so that a whole shift can sign in from behind one address. */
export async function returnToBudget(name: Budget, key: string): Promise<void> {
  await limiter(name).reward(key)
}

/** Gives the whole budget of a key back. */
export async function restoreBudget(name: Budget, key: string): Promise<void> {
  await limiter(name).delete(key)
}

/**
 * The caller's address. The server writes the peer's own address at the end of X-Forwarded-For, so that what a caller put
 * there stands before it; with proxies in front, each of them counts one place further to the left.
 */
export function callerAddress(headers: Headers, trustedProxies = environment.TRUSTED_PROXIES): string {
  const chain = (headers.get('x-forwarded-for') ?? '').split(',').map((one) => one.trim())
  const address = chain[chain.length - 1 - trustedProxies] ?? chain[0] ?? ''
  const plain = address.startsWith('::ffff:') ? address.slice(7) : address
  return isIP(plain) === 0 ? 'unknown' : plain
}

/** The network of an address, for the list of sessions and for budgets: /24, or /64 for IPv6. */
export function networkOf(address: string): string {
  if (address === '::1' || address.startsWith('127.')) return 'this machine'
  if (isIP(address) === 4) return `${address.split('.').slice(0, 3).join('.')}.0/24`
  if (isIP(address) !== 6) return 'unknown'
  const [head = '', tail = ''] = address.split('::')
  const left = head === '' ? [] : head.split(':')
  const right = tail === '' ? [] : tail.split(':')
  const zeros = address.includes('::') ? Array.from({ length: 8 - left.length - right.length }, () => '0') : []
  return `${[...left, ...zeros, ...right].slice(0, 4).join(':')}::/64`
}
