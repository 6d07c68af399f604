import 'server-only'
import { createHash, randomUUID } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { type IncomingMessage } from 'node:http'
import path from 'node:path'
import { Readable, Transform } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { type ReadableStream as WebStream } from 'node:stream/web'
import formidable, { errors as formidableErrors, type File } from 'formidable'
import { AppError } from '../domain/errors'
import { cleanFileName } from './clean-file-name'

export interface ReceivedFile {
  readonly path: string
  readonly sha256: string
  readonly byteCount: number
  /** as it may be shown */
  readonly name: string
}

export interface ReceiveOptions {
  /** a folder of this request's own, which the caller removes whatever happens */
  readonly folder: string
  readonly maximumBytes: number
  readonly maximumFiles: number
}

/**
 * Streams the files of a request into a folder: a multipart body by formidable, any other body as one file named by the header
 * `X-File-Name`. Bytes are counted and hashed as they pass; a body that stops short of its length is refused.
 */
export async function receiveFiles(request: Request, options: ReceiveOptions): Promise<ReceivedFile[]> {
  const declared = declaredLength(request.headers)
  // boundaries and part headers come on top of the files
  const allowance = options.maximumBytes + 1_048_576
  if (declared !== null && declared > allowance) throw tooLarge(options.maximumBytes)
  if (request.body === null) throw new AppError('invalid', 'The request has no body. Send the file itself.')
  const type = request.headers.get('content-type') ?? ''
  const counter = new Counter(allowance, options.maximumBytes)
  const source = Readable.fromWeb(request.body as WebStream<Uint8Array>)
  try {
    const files = /^multipart\/form-data/i.test(type)
      ? await receiveMultipart(source, counter, request.headers, options)
      : await receiveBody(source, counter, request.headers, options)
    if (declared !== null && counter.bytes !== declared)
      throw new AppError(
        'invalid',
        `The transfer was cut off: ${String(counter.bytes)} of ${String(declared)} bytes came. Send the file again.`,
      )
    if (files.length === 0) throw new AppError('invalid', 'The request holds no file.')
    checkHash(files, request.headers.get('x-file-sha256'))
    return files
  } catch (cause) {
    throw mapped(cause, options)
  } finally {
    source.destroy()
    counter.destroy()
  }
}

class Counter extends Transform {
  bytes = 0
  constructor(
    readonly allowance: number,
    readonly maximumBytes: number,
  ) {
    super()
  }

  override _transform(
    chunk: Uint8Array,
    _encoding: BufferEncoding,
    done: (error?: Error | null, data?: unknown) => void,
  ) {
    this.bytes += chunk.length
    if (this.bytes > this.allowance) done(tooLarge(this.maximumBytes))
    else done(null, chunk)
  }
}

async function receiveMultipart(
  source: Readable,
  counter: Counter,
  headers: Headers,
  options: ReceiveOptions,
): Promise<ReceivedFile[]> {
  const plain = Object.fromEntries(headers)
  // with neither length nor chunks announced, formidable takes the body for empty
  if (plain['content-length'] === undefined) plain['transfer-encoding'] ??= 'chunked'
  const incoming = Object.assign(counter, { headers: plain }) as unknown as IncomingMessage
  const form = formidable({
    uploadDir: options.folder,
    keepExtensions: false,
    filename: () => randomUUID(),
    maxFiles: options.maximumFiles,
    maxFields: 20,
    maxFieldsSize: 65_536,
    maxFileSize: options.maximumBytes,
    maxTotalFileSize: options.maximumBytes,
    minFileSize: 1,
    allowEmptyFiles: false,
    hashAlgorithm: 'sha256',
    filter: (part) => part.originalFilename !== null && part.mimetype !== null,
  })
  // with a name and no type a part would be kept in memory as a field, with a type and no name be passed over: a file lost either way
  let half: string | null = null
  const handle = form.onPart.bind(form)
  form.onPart = (part) => {
    if ((part.originalFilename === null) !== (part.mimetype === null))
      half ??= cleanFileName(part.originalFilename ?? part.name ?? '')
    return handle(part)
  }
  const piped = pipeline(source, counter)
  // the pipe's own failure is told by the parse below, which it makes fail
  piped.catch(() => undefined)
  const [, files] = await form.parse(incoming)
  await piped
  if (half !== null)
    throw new AppError(
      'invalid',
      `The part “${String(half)}” of the form needs both a file name and a Content-Type, such as application/octet-stream. Nothing was taken in.`,
    )
  const received: ReceivedFile[] = []
  for (const field of Object.keys(files)) {
    if (!Object.hasOwn(files, field)) continue
    for (const file of files[field] ?? []) received.push(described(file))
  }
  return received
}

function described(file: File): ReceivedFile {
  if (typeof file.hash !== 'string') throw new Error('a file came without its hash')
  return {
    path: file.filepath,
    sha256: file.hash,
    byteCount: file.size,
    name: cleanFileName(file.originalFilename ?? ''),
  }
}

async function receiveBody(
  source: Readable,
  counter: Counter,
  headers: Headers,
  options: ReceiveOptions,
): Promise<ReceivedFile[]> {
  const target = path.join(options.folder, randomUUID())
  const hash = createHash('sha256')
  await pipeline(
    source,
    counter,
    async function* (chunks: AsyncIterable<Uint8Array>) {
      for await (const chunk of chunks) {
        hash.update(chunk)
        yield chunk
      }
    },
    createWriteStream(target, { mode: 0o600, flags: 'wx' }),
  )
  if (counter.bytes === 0) throw new AppError('invalid', 'The file is empty.')
  if (counter.bytes > options.maximumBytes) throw tooLarge(options.maximumBytes)
  return [
    { path: target, sha256: hash.digest('hex'), byteCount: counter.bytes, name: cleanFileName(headerName(headers)) },
  ]
}

/** A header holds Latin letters only, so other names come percent-encoded. */
function headerName(headers: Headers): string {
  const name = headers.get('x-file-name') ?? ''
  try {
    return decodeURIComponent(name)
  } catch {
    return name
  }
}

function declaredLength(headers: Headers): number | null {
  const text = headers.get('content-length')
  return text !== null && /^\d{1,15}$/.test(text) ? Number(text) : null
}

function checkHash(files: readonly ReceivedFile[], stated: string | null): void {
  if (stated === null) return
  if (files.length !== 1 || files[0]?.sha256 !== stated.trim().toLowerCase())
    throw new AppError('invalid', 'The bytes that came do not have the SHA-256 that was stated. Send the file again.')
}

function tooLarge(maximumBytes: number): AppError {
  return new AppError(
    'too-large',
    `The files are larger than ${(maximumBytes / 1_000_000).toLocaleString('en-GB', { maximumFractionDigits: 1 })} MB together. Divide the log, or ask an admin for a higher limit.`,
  )
}

function mapped(cause: unknown, options: ReceiveOptions): unknown {
  if (cause instanceof AppError) return cause
  const inner = cause instanceof Error && cause.cause instanceof AppError ? cause.cause : null
  if (inner !== null) return inner
  if (cause instanceof Error && 'code' in cause && cause.code === 'ENOSPC')
    return new AppError('storage-full', 'There is no space left for the file. Tell an admin.', {}, { cause })
  const isFormidable = cause instanceof formidableErrors.default || (cause instanceof Error && 'httpCode' in cause)
  if (!isFormidable) {
    // the sender went away, or the line did
    return new AppError(
      'invalid',
      'The transfer was cut off before the file was complete. Send it again.',
      {},
      { cause },
    )
  }
  const status = 'httpCode' in cause ? cause.httpCode : 400
  const code = 'code' in cause ? cause.code : 0
  if (code === formidableErrors.maxFilesExceeded)
    return new AppError(
      'too-large',
      `At most ${String(options.maximumFiles)} files at a time. Send them in several requests.`,
      {},
      { cause },
    )
  if (status === 413) return tooLarge(options.maximumBytes)
  if (code === formidableErrors.noEmptyFiles || code === formidableErrors.smallerThanMinFileSize)
    return new AppError('invalid', 'One of the files is empty. Nothing was taken in.', {}, { cause })
  if (status === 415)
    return new AppError(
      'unsupported',
      'Send the files as multipart/form-data, or one file as the body with its name in X-File-Name.',
      {},
      { cause },
    )
  return new AppError(
    'invalid',
    'The form with the files is incomplete: it ends before its closing boundary. Send it again.',
    {},
    { cause },
  )
}
