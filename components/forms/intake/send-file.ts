import { RequestError } from '@/components/server-state/fetch-json'

export interface SendOptions {
  readonly signal: AbortSignal
  /** bytes that left, of the bytes to send; the second number is 0 while it is not known */
  readonly onProgress: (sentBytes: number, totalBytes: number) => void
}

/** The connection broke before an answer came: whether the server has the file is not known, and sending it again does no harm. */
export class ConnectionLost extends Error {
  constructor() {
    super('The connection broke. Send it again when it is back; a file that did arrive is not stored twice.')
    this.name = 'ConnectionLost'
  }
}

/** The refusal in a problem body (RFC 9457). */
function refusalOf(text: string, status: number): RequestError {
  let body: unknown = null
  try {
    body = JSON.parse(text)
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error
  }
  const fallback = status === 413 ? 'The file is larger than is taken here.' : `The server answered ${String(status)}.`
  if (typeof body !== 'object' || body === null) return new RequestError(fallback, status)
  const sentence = 'detail' in body && typeof body.detail === 'string' ? body.detail : fallback
  const issues: readonly unknown[] = 'issues' in body && Array.isArray(body.issues) ? body.issues : []
  const fields = issues.flatMap((issue) =>
    typeof issue === 'object' && issue !== null && 'field' in issue && typeof issue.field === 'string'
      ? [issue.field]
      : [],
  )
  return new RequestError(sentence, status, fields)
}

/**
 * Sends files as multipart in one request and tells how far it is, which fetch cannot. The type is that of the route's answer.
 * @throws RequestError for a refusal, ConnectionLost without an answer, DOMException AbortError when cancelled
 */
export function sendFiles<T>(path: string, files: readonly File[], { signal, onProgress }: SendOptions): Promise<T> {
  return new Promise((resolve, reject) => {
    if (signal.aborted) return reject(new DOMException('cancelled', 'AbortError'))
    const request = new XMLHttpRequest()
    const cancel = () => request.abort()
    request.open('POST', path)
    request.setRequestHeader('Accept', 'application/json')
    request.upload.addEventListener('progress', (event) =>
      onProgress(event.loaded, event.lengthComputable ? event.total : 0),
    )
    request.addEventListener('loadend', () => signal.removeEventListener('abort', cancel))
    request.addEventListener('load', () => {
      if (request.status < 200 || request.status >= 300) return reject(refusalOf(request.responseText, request.status))
      resolve(JSON.parse(request.responseText))
    })
    request.addEventListener('error', () => reject(new ConnectionLost()))
    request.addEventListener('timeout', () => reject(new ConnectionLost()))
    request.addEventListener('abort', () => reject(new DOMException('cancelled', 'AbortError')))
    signal.addEventListener('abort', cancel)
    const form = new FormData()
    // a part without a type is not taken for a file
    for (const file of files)
      form.append('file', file.type === '' ? new File([file], file.name, { type: 'application/octet-stream' }) : file)
    request.send(form)
  })
}
