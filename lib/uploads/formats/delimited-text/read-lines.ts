import { type ByteSource } from './byte-source'
import { type Encoding } from './sniff-encoding'

const STEP = 1 << 18

export interface LineEnd {
  readonly reason: 'end' | 'stopped' | 'line-too-long'
  /** one-based number of the last line met */
  readonly line: number
  readonly endsWithLineBreak: boolean
}

/**
 * Lines in order, with CRLF, LF or CR ends (mixed too), decoded step by step, so that a file of any size costs the same memory. A line beyond
 * the limit stops the reading: it is no table.
 */
export function readLines(
  source: ByteSource,
  encoding: Encoding,
  maximumLength: number,
  visit: (line: string, number: number) => boolean,
): LineEnd {
  const decoder = new TextDecoder(encoding.label, { ignoreBOM: true })
  let offset = encoding.markLength
  let carry = ''
  let number = 0
  let skipLineFeed = false
  for (;;) {
    const bytes = source.read(offset, STEP)
    offset += bytes.length
    const isLast = bytes.length === 0 || offset >= source.size
    let text = decoder.decode(bytes, { stream: !isLast })
    if (skipLineFeed && text !== '') {
      if (text.charCodeAt(0) === 10) text = text.slice(1)
      skipLineFeed = false
    }
    if (carry !== '') text = carry + text
    const hasReturns = text.indexOf('\r') >= 0
    let from = 0
    for (;;) {
      let end = text.indexOf('\n', from)
      let next = end + 1
      if (hasReturns) {
        const carriage = text.indexOf('\r', from)
        if (carriage >= 0 && (end < 0 || carriage < end)) {
          end = carriage
          next = text.charCodeAt(carriage + 1) === 10 ? carriage + 2 : carriage + 1
          // the line feed of this line end may come with the next bytes
          if (carriage + 1 === text.length && !isLast) skipLineFeed = true
        }
      }
      if (end < 0) break
      number++
      if (end - from > maximumLength) return { reason: 'line-too-long', line: number, endsWithLineBreak: true }
      if (!visit(text.slice(from, end), number)) return { reason: 'stopped', line: number, endsWithLineBreak: true }
      from = next
    }
    carry = from === 0 ? text : text.slice(from)
    if (carry.length > maximumLength) return { reason: 'line-too-long', line: number + 1, endsWithLineBreak: true }
    if (isLast) {
      const isOpen = carry !== ''
      if (isOpen) {
        number++
        visit(carry, number)
      }
      return { reason: 'end', line: number, endsWithLineBreak: !isOpen }
    }
  }
}
