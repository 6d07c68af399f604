import { closeSync, fstatSync, openSync, readSync } from 'node:fs'

/** Bytes read from the front, from a file or from memory. Reading is synchronous: readers run in a thread of their own. */
export interface ByteSource {
  readonly size: number
  readonly read: (offset: number, length: number) => Uint8Array
  readonly close: () => void
}

export function openByteSource(input: string | Uint8Array): ByteSource {
  if (typeof input !== 'string')
    return {
      size: input.byteLength,
      read: (offset, length) => input.subarray(offset, offset + length),
      close: () => undefined,
    }
  const file = openSync(input, 'r')
  return {
    size: fstatSync(file).size,
    read: (offset, length) => {
      const buffer = Buffer.allocUnsafe(length)
      let filled = 0
      while (filled < length) {
        const count = readSync(file, buffer, filled, length - filled, offset + filled)
        if (count === 0) break
        filled += count
      }
      return buffer.subarray(0, filled)
    },
    close: () => closeSync(file),
  }
}
