import { createHash } from 'node:crypto'

/** Fingerprint of a header row, units included: the same instrument's next file has the same one. Case, accents, spaces and the sheet's name do not count. */
export function fingerprint(headers: readonly string[]): string {
  const normal = headers.map((header) => header.normalize('NFKC').toLowerCase().replace(/\s+/g, ' ').trim())
  return createHash('sha256').update(normal.join('\u001f')).digest('hex')
}
