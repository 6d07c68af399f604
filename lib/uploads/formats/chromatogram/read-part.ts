import { LIMITS } from '../../limits'
import { type Archive } from '../open-archive'
import { Refusal } from '../refusal'

/** The bytes of one chromatogram in a packed set, counted as they come out, since a directory can lie about them. */
export async function readPart(archive: Archive, name: string): Promise<Uint8Array> {
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of await archive.open(name)) {
    if (!Buffer.isBuffer(chunk)) throw new TypeError('a packed part gives bytes')
    size += chunk.length
    if (size > LIMITS.chromatogram.bytes) throw tooLarge(name)
    chunks.push(chunk)
  }
  return Buffer.concat(chunks, size)
}

export function tooLarge(name: string): Refusal {
  const megabytes = String(LIMITS.chromatogram.bytes / 1024 / 1024)
  return new Refusal({
    code: 'too-large',
    found: `“${name}” of more than ${megabytes} MB`,
    expected: `at most ${megabytes} MB a chromatogram`,
    sentence: `The chromatogram “${name}” is larger than ${megabytes} MB. Export it without its trace, with the peak table alone.`,
  })
}
