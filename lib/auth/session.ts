import 'server-only'
import { sealData, unsealData } from 'iron-session'
import { cookies } from 'next/headers'
import { environment } from '../environment'
import { SESSION_LIFE_S } from './session-life'

/** A device that signed somebody in is known for so long: strangers who guess passwords cannot lock its owner out. */
const DEVICE_LIFE_S = 90 * 86_400

/**
 * Browsers take `__Host-` cookies only over https or from localhost. On a laboratory network with plain http, stated
 * outright as APP_ORIGIN, the cookie has another name and no Secure mark; whoever listens on that network can read it.
 */
export function isOriginTrustworthy(appOrigin = environment.APP_ORIGIN): boolean {
  const { protocol, hostname } = new URL(appOrigin)
  return protocol === 'https:' || ['localhost', '127.0.0.1', '[::1]'].includes(hostname)
}

function cookieName(name: string): string {
  return isOriginTrustworthy() ? `__Host-${name}` : `${name}-plain`
}

/** What is under a seal; nothing where it is broken, has run out, was made with another key, or never was one. */
async function unseal(sealed: string, password: string, ttl: number): Promise<unknown> {
  try {
    return await unsealData(sealed, { password, ttl })
  } catch (error) {
    // Some broken seals are answered with an empty object, others are thrown; to us they are all one.
    return error instanceof Error ? {} : Promise.reject(error)
  }
}

async function readSealed(name: string, ttl: number): Promise<Readonly<Record<string, unknown>>> {
  const sealed = (await cookies()).get(cookieName(name))?.value
  if (sealed === undefined || sealed.length > 4_096) return {}
  for (const password of [environment.SESSION_KEY, environment.SESSION_KEY_PREVIOUS]) {
    if (password === undefined) continue
    const content = await unseal(sealed, password, ttl)
    if (typeof content === 'object' && content !== null && Object.keys(content).length > 0) return { ...content }
  }
  return {}
}

async function writeSealed(name: string, ttl: number, content: object, isKept: boolean): Promise<void> {
  const sealed = await sealData(content, { password: environment.SESSION_KEY, ttl })
  const store = await cookies()
  store.set(cookieName(name), sealed, {
    httpOnly: true,
    secure: isOriginTrustworthy(),
    sameSite: 'lax',
    path: '/',
    // Without an age the cookie goes when the browser closes.
    ...(isKept ? { maxAge: ttl } : {}),
  })
}

/** The secret of the session in the request's cookie; null if there is none, or its seal was broken or has run out. */
export async function readSessionSecret(): Promise<string | null> {
  const { sid } = await readSealed('sid', SESSION_LIFE_S)
  return typeof sid === 'string' && /^[A-Za-z0-9_-]{43}$/.test(sid) ? sid : null
}

/** Only in an action or a handler: a page cannot set cookies. */
export async function writeSessionSecret(secret: string): Promise<void> {
  await writeSealed('sid', SESSION_LIFE_S, { sid: secret }, false)
}

export async function clearSessionSecret(): Promise<void> {
  const store = await cookies()
  store.set(cookieName('sid'), '', {
    httpOnly: true,
    secure: isOriginTrustworthy(),
    sameSite: 'lax',
    path: '/',
    maxAge: 0,
  })
}

/** People whom this device has signed in before. */
export async function readKnownPeople(): Promise<readonly string[]> {
  const { people } = await readSealed('device', DEVICE_LIFE_S)
  return Array.isArray(people) ? people.filter((one) => typeof one === 'string') : []
}

export async function rememberDevice(userId: string): Promise<void> {
  const others = (await readKnownPeople()).filter((one) => one !== userId)
  await writeSealed('device', DEVICE_LIFE_S, { people: [userId, ...others].slice(0, 8) }, true)
}
