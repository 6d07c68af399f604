import { type Upload } from '@/lib/domain/intake'

/** A file on its way, or what became of it. */
export interface Transfer {
  readonly key: string
  readonly name: string
  readonly byteCount: number
  readonly sent: number
  readonly state: 'sending' | 'reading' | 'done' | 'known' | 'failed' | 'cancelled'
  readonly message: string
}

export interface SentFile {
  readonly upload: Upload
  readonly isNew: boolean
}

interface Listener {
  readonly onProgress: (sent: number) => void
  readonly onSent: () => void
}

/** One file by one request, so that each has its own progress and can be cancelled alone. `XMLHttpRequest`, because `fetch` does not tell how much was sent. */
export function sendFile(
  runId: string,
  file: File,
  listener: Listener,
): { readonly done: Promise<SentFile>; readonly cancel: () => void } {
  const request = new XMLHttpRequest()
  const done = new Promise<SentFile>((resolve, reject) => {
    request.open('POST', `/api/v1/runs/${encodeURIComponent(runId)}/uploads`)
    request.setRequestHeader('Accept', 'application/json')
    request.responseType = 'json'
    request.upload.addEventListener('progress', (event) => listener.onProgress(event.loaded))
    request.upload.addEventListener('load', () => listener.onSent())
    request.addEventListener('load', () => {
      const body = request.response as { items?: (Upload & { isNew: boolean })[]; detail?: string } | null
      const item = body?.items?.[0]
      if (request.status < 300 && item !== undefined) {
        const { isNew, ...upload } = item
        resolve({ upload, isNew })
      } else reject(new Error(body?.detail ?? `The server answered ${request.status}. Send the file again.`))
    })
    request.addEventListener('error', () =>
      reject(new Error('The connection was lost. Nothing of the file was kept; send it again when you are back.')),
    )
    request.addEventListener('abort', () => reject(new DOMException('cancelled', 'AbortError')))
    const form = new FormData()
    // a part without a type is not taken for a file
    form.append(
      'file',
      new File([file], file.name, { type: file.type === '' ? 'application/octet-stream' : file.type }),
    )
    request.send(form)
  })
  return { done, cancel: () => request.abort() }
}

/** Changes something of a file; throws the sentence of the answer when it is refused. */
export async function changeUpload(
  upload: Pick<Upload, 'id' | 'version'>,
  path: '' | '/confirm' | '/set-aside',
  body: unknown,
): Promise<Upload> {
  const answer = await fetch(`/api/v1/uploads/${encodeURIComponent(upload.id)}${path}`, {
    method: path === '' ? 'PATCH' : 'POST',
    headers: {
      Accept: 'application/json',
      'If-Match': `W/"${upload.id}.${upload.version}"`,
      ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
    },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  })
  const text: unknown = await answer.json().catch(() => null)
  if (answer.ok) return text as Upload
  const problem = text as { detail?: string; issues?: { message: string }[] } | null
  throw new Error(problem?.detail ?? `The server answered ${answer.status}.`)
}
