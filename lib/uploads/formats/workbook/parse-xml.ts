import { type Readable } from 'node:stream'
import { SaxesParser } from 'saxes'
import { LIMITS } from '../../limits'
import { Refusal } from '../refusal'

export interface XmlVisitor {
  readonly open?: (name: string, attributes: Readonly<Record<string, string>>) => void
  readonly text?: (text: string) => void
  readonly close?: (name: string) => void
  /** asked after every step; true ends the reading early */
  readonly isDone?: () => boolean
}

/** Longest stretch without a tag: a cell holds at most 32,767 characters, this is what an attack has. */
const MAXIMUM_STRETCH = 1_000_000

/**
 * Streams one XML part through a parser that knows no entities but the five of the language. Document type declarations are refused: with
 * them come entity bombs and reads of other files. Names are given without their prefix.
 */
export async function parseXml(stream: Readable, visitor: XmlVisitor): Promise<void> {
  const parser = new SaxesParser({ xmlns: false, position: false })
  let failure: Error | null = null
  let depth = 0
  parser.on('error', (error) => {
    failure ??= error
  })
  parser.on('doctype', () => {
    failure ??= new Refusal({
      code: 'unreadable',
      found: 'a document type declaration',
      expected: 'a workbook as a spreadsheet program writes it',
      sentence: 'The workbook has a document type declaration, which no spreadsheet program writes. It was not opened.',
    })
  })
  parser.on('opentag', (tag) => {
    if (failure !== null) return
    depth++
    if (depth > LIMITS.workbook.xmlDepth) failure = new Error('tags too deep')
    visitor.open?.(local(tag.name), tag.attributes)
  })
  parser.on('text', (text) => {
    if (failure === null) visitor.text?.(text)
  })
  parser.on('cdata', (text) => {
    if (failure === null) visitor.text?.(text)
  })
  parser.on('closetag', (tag) => {
    depth--
    if (failure === null) visitor.close?.(local(tag.name))
  })
  const decoder = new TextDecoder('utf-8', { fatal: true })
  let bytes = 0
  let stretch = 0
  try {
    for await (const chunk of stream) {
      if (!(chunk instanceof Uint8Array)) continue
      bytes += chunk.length
      if (bytes > LIMITS.workbook.entryBytes)
        throw new Refusal({
          code: 'too-large',
          found: 'a part that goes on unpacking',
          expected: `at most ${String(LIMITS.workbook.entryBytes / 1024 / 1024)} MB`,
          sentence: 'A part of the workbook is larger than it declares. It was not read on.',
        })
      const text = decoder.decode(chunk, { stream: true })
      const lastTag = Math.max(text.lastIndexOf('<'), text.lastIndexOf('>'))
      stretch = lastTag < 0 ? stretch + text.length : text.length - lastTag
      if (stretch > MAXIMUM_STRETCH)
        throw new Refusal({
          code: 'limit-reached',
          found: 'a stretch of a million characters without a tag',
          expected: 'cells of at most 32,767 characters',
          sentence: 'The workbook has a cell of more than a million characters. It was not read on.',
        })
      parser.write(text)
      if (failure !== null) throw failure as Error
      if (visitor.isDone?.() === true) return
    }
    parser.close()
    if (failure !== null) throw failure as Error
  } catch (cause) {
    if (cause instanceof Refusal) throw cause
    throw new Refusal({
      code: 'unreadable',
      found: cause instanceof Error ? cause.message : 'a damaged part',
      expected: 'a complete workbook',
      sentence: 'A part of the workbook cannot be read: the file is damaged. Save it again and add the new file.',
    })
  } finally {
    stream.destroy()
  }
}

function local(name: string): string {
  const colon = name.indexOf(':')
  return colon < 0 ? name : name.slice(colon + 1)
}
