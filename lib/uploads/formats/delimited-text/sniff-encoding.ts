import { isUtf8 } from 'node:buffer'
import { type ByteSource } from './byte-source'

export interface Encoding {
  /** name for a text decoder */
  readonly label: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252'
  /** for people, with how it was told */
  readonly said: string
  /** bytes of the byte-order mark */
  readonly markLength: number
}

const STEP = 1 << 20

/** Encoding by mark, else UTF-16 by its pattern of zero bytes, else UTF-8 where every byte of the file agrees, else Windows-1252; null for what is no text. */
export function sniffEncoding(source: ByteSource): Encoding | null {
  const head = source.read(0, 4_096)
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf)
    return isUtf8Throughout(source, 3)
      ? { label: 'utf-8', said: 'UTF-8 with byte-order mark', markLength: 3 }
      : { label: 'windows-1252', said: 'Windows-1252 behind a UTF-8 byte-order mark', markLength: 3 }
  if (head[0] === 0xff && head[1] === 0xfe)
    return { label: 'utf-16le', said: 'UTF-16 with byte-order mark', markLength: 2 }
  if (head[0] === 0xfe && head[1] === 0xff)
    return { label: 'utf-16be', said: 'UTF-16 (big-endian) with byte-order mark', markLength: 2 }
  const zeros = countZeros(head)
  if (zeros.even + zeros.odd > 0) {
    const half = head.length / 2
    // mostly Latin text in UTF-16 has a zero in every second byte
    if (half >= 2 && zeros.odd > 0.7 * half && zeros.even < 0.05 * half)
      return { label: 'utf-16le', said: 'UTF-16 without mark', markLength: 0 }
    if (half >= 2 && zeros.even > 0.7 * half && zeros.odd < 0.05 * half)
      return { label: 'utf-16be', said: 'UTF-16 (big-endian) without mark', markLength: 0 }
    return null
  }
  if (hasControls(head)) return null
  if (isUtf8Throughout(source, 0)) return { label: 'utf-8', said: 'UTF-8', markLength: 0 }
  return { label: 'windows-1252', said: 'Windows-1252', markLength: 0 }
}

function countZeros(bytes: Uint8Array): { even: number; odd: number } {
  let even = 0
  let odd = 0
  for (let i = 0; i < bytes.length; i++) {
    if (bytes[i] !== 0) continue
    if (i % 2 === 0) even++
    else odd++
  }
  return { even, odd }
}

/** More than stray control characters: an image, a program, a packed file. */
function hasControls(bytes: Uint8Array): boolean {
  let controls = 0
  for (const byte of bytes)
    if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12 && byte !== 26) controls++
  return controls > bytes.length / 100
}

/** Strict check of the whole file in steps, each cut before a character that goes on into the next. */
function isUtf8Throughout(source: ByteSource, from: number): boolean {
  let offset = from
  while (offset < source.size) {
    const bytes = source.read(offset, STEP)
    if (bytes.length === 0) return true
    const isLast = offset + bytes.length >= source.size
    const length = isLast ? bytes.length : beforeOpenCharacter(bytes)
    // a file cut off inside its last character is still UTF-8
    const checked = isLast ? bytes.subarray(0, beforeOpenCharacter(bytes)) : bytes.subarray(0, length)
    if (!isUtf8(checked)) return false
    if (isLast) return checked.length === bytes.length || bytes.length - checked.length <= 3
    offset += length
  }
  return true
}

function beforeOpenCharacter(bytes: Uint8Array): number {
  for (let back = 1; back <= 4 && back <= bytes.length; back++) {
    const byte = bytes[bytes.length - back] ?? 0
    if (byte < 0x80) return bytes.length
    if (byte >= 0xc0) {
      const needed = byte >= 0xf0 ? 4 : byte >= 0xe0 ? 3 : 2
      return back < needed ? bytes.length - back : bytes.length
    }
  }
  return bytes.length
}
