/** A refused or failed request, with the sentence of the answer's problem body where it has one. */
export class RequestError extends Error {
  constructor(
    message: string,
    readonly status: number,
    /** the fields that the answer found at fault */
    readonly fields: readonly string[] = [],
  ) {
    super(message)
    this.name = 'RequestError'
  }
}

/** Sentence of a problem body (RFC 9457). */
function sentenceOf(body: unknown, status: number): string {
  if (typeof body === 'object' && body !== null && 'detail' in body && typeof body.detail === 'string') {
    return body.detail
  }
  if (typeof body === 'object' && body !== null && 'title' in body && typeof body.title === 'string') return body.title
  return `The server answered ${status}.`
}

/** JSON from the product's own API; the type is that of the route, which the server builds from the same domain type. */
export async function fetchJson<T>(path: string, signal?: AbortSignal): Promise<T> {
  const answer = await fetch(path, { headers: { Accept: 'application/json' }, ...(signal ? { signal } : {}) })
  if (!answer.ok) {
    const body: unknown = await answer.json().catch(() => null)
    throw new RequestError(sentenceOf(body, answer.status), answer.status)
  }
  return answer.json()
}
