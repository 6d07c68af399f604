import { RequestError } from './fetch-json'

/** The tag a record's version travels under: the server refuses a change made from an older one. */
export function versionTag(record: { readonly id: string; readonly version: number }): string {
  return `W/"${record.id}.${String(record.version)}"`
}

/** Sends a change to the product's own API; the type is that of the route. A refusal is thrown with the sentence of its problem body. */
export async function sendJson<T>(
  path: string,
  method: 'POST' | 'PATCH' | 'PUT',
  record: { readonly id: string; readonly version: number },
  body?: unknown,
): Promise<T> {
  const answer = await fetch(path, {
    method,
    headers: {
      Accept: 'application/json',
      'If-Match': versionTag(record),
      ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
    },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  })
  if (!answer.ok) {
    const problem: unknown = await answer.json().catch(() => null)
    const detail =
      typeof problem === 'object' && problem !== null && 'detail' in problem && typeof problem.detail === 'string'
        ? problem.detail
        : `The server answered ${String(answer.status)}.`
    throw new RequestError(detail, answer.status)
  }
  return answer.json()
}
