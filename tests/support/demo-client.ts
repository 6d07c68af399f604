/** A script's way in: a token of one of the demo's people, and calls that say what went wrong. */
export async function demoClient(origin: string, role: string) {
  const answer = await fetch(`${origin}/api/v1/tokens`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({
      email: `${role}@calderquay.example`,
      password: 'straw bronze violet blue',
      name: 'bench',
      scopes: ['read', 'intake', 'write'],
    }),
  })
  const { secret } = (await answer.json()) as { secret: string }
  return async <T = unknown>(route: string, init: RequestInit = {}): Promise<T> => {
    const reply = await fetch(`${origin}/api/v1${route}`, {
      ...init,
      headers: { authorization: `Bearer ${secret}`, ...init.headers },
    })
    if (!reply.ok) throw new Error(`${init.method ?? 'GET'} ${route}: ${reply.status} ${await reply.text()}`)
    return (await reply.json()) as T
  }
}

export const percentile = (values: readonly number[], share: number) =>
  [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(share * values.length))] ?? Number.NaN
