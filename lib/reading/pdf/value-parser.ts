import { Malformed, PdfRef, type PdfDict, type PdfValue } from './value'

const spaces = new Uint8Array(256)
for (const c of [0, 9, 10, 12, 13, 32]) spaces[c] = 1
const ends = new Uint8Array(spaces)
for (const c of '()<>[]{}/%') ends[c.charCodeAt(0)] = 1

const deepest = 60
const longestString = 1 << 20
const [slash, open, close, less, more, left, right, percent, backslash] = [...'/()<>[]%\\'].map((c) => c.charCodeAt(0)) as [number, number, number, number, number, number, number, number, number]

/** The bytes at hand ended in the middle of a value: with more of the file at hand it may be read. */
export class RanOut extends Malformed {}

/** Reads values one after the other from `bytes`. A string is passed through `clear`, which deciphers it. */
export class ValueParser {
  constructor(readonly bytes: Uint8Array, public at = 0, private readonly clear: (text: Uint8Array) => Uint8Array = (text) => text) {}

  skipSpace(): void {
    const { bytes } = this
    for (;;) {
      while (spaces[bytes[this.at] ?? 1]) {
        if (this.at >= bytes.length) return
        this.at++
      }
      if (bytes[this.at] !== percent) return
      while (this.at < bytes.length && bytes[this.at] !== 10 && bytes[this.at] !== 13) this.at++
    }
  }

  /** The next run of ordinary characters; empty at a delimiter. */
  word(): string {
    const { bytes } = this
    const from = this.at
    while (this.at < bytes.length && !ends[bytes[this.at]!]) this.at++
    if (this.at >= bytes.length) throw new RanOut()
    return latin1(bytes, from, Math.min(this.at, from + 256))
  }

  /** A whole number that has to stand here. */
  whole(): number {
    this.skipSpace()
    const text = this.word()
    if (!/^\+?\d{1,15}$/.test(text)) throw new Malformed('no whole number')
    return Number(text)
  }

  /** A word that has to stand here. */
  expect(word: string): void {
    this.skipSpace()
    for (let k = 0; k < word.length; k++) {
      if (this.at + k >= this.bytes.length) throw new RanOut()
      if (this.bytes[this.at + k] !== word.charCodeAt(k)) throw new Malformed(`no ${word}`)
    }
    this.at += word.length
  }

  value(depth = 0): PdfValue {
    if (depth > deepest) throw new Malformed('nested too deep')
    this.skipSpace()
    const c = this.bytes[this.at]
    if (c === undefined) throw new RanOut()
    if (c === slash) return this.name()
    if (c === open) return this.clear(this.string())
    if (c === left) return this.list(depth)
    if (c === less) return this.bytes[this.at + 1] === less ? this.dict(depth) : this.clear(this.hex())
    if (ends[c]) throw new Malformed('no value')
    return this.numberOrWord()
  }

  private numberOrWord(): PdfValue {
    const text = this.word()
    const first = text.charCodeAt(0)
    if ((first >= 48 && first <= 57) || first === 43 || first === 45 || first === 46) return this.refOr(text)
    if (text === 'true') return true
    if (text === 'false') return false
    if (text === 'null') return null
    throw new Malformed('unknown word')
  }

  private refOr(text: string): PdfValue {
    const number = Number.parseFloat(text.replace(/^[+-]*(?=-)/, ''))
    const value = Number.isFinite(number) ? number : 0
    if (!/^\d{1,8}$/.test(text)) return value
    const back = this.at
    try {
      const generation = this.whole()
      this.skipSpace()
      if (generation < 65536 && this.word() === 'R') return new PdfRef(value, generation)
    } catch (error) {
      if (error instanceof RanOut) throw error
    }
    this.at = back
    return value
  }

  private name(): string {
    this.at++
    const text = this.word()
    return text.includes('#') ? text.replace(/#([0-9a-fA-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16))) : text
  }

  private list(depth: number): PdfValue[] {
    this.at++
    const items: PdfValue[] = []
    for (;;) {
      this.skipSpace()
      if (this.bytes[this.at] === right) break
      items.push(this.value(depth + 1))
    }
    this.at++
    return items
  }

  private dict(depth: number): PdfDict {
    this.at += 2
    const entries = new Map<string, PdfValue>()
    for (;;) {
      this.skipSpace()
      const c = this.bytes[this.at]
      if (c === undefined) throw new RanOut()
      if (c === more) break
      if (c !== slash) throw new Malformed('no key')
      const key = this.name()
      this.skipSpace()
      // a key without a value, at the end
      if (this.bytes[this.at] === more) break
      entries.set(key, this.value(depth + 1))
    }
    if (this.at + 1 >= this.bytes.length) throw new RanOut()
    this.at += this.bytes[this.at + 1] === more ? 2 : 1
    return entries
  }

  private hex(): Uint8Array {
    const end = this.bytes.indexOf(more, this.at)
    if (end < 0) throw new RanOut()
    const digits = latin1(this.bytes, this.at + 1, end).replace(/[^0-9a-fA-F]/g, '')
    this.at = end + 1
    return Buffer.from(digits.length % 2 ? `${digits}0` : digits, 'hex')
  }

  private string(): Uint8Array {
    const out: number[] = []
    let depth = 1
    for (this.at++; ; this.at++) {
      const c = this.bytes[this.at]
      if (c === undefined) throw new RanOut()
      if (out.length > longestString) throw new Malformed('string too long')
      if (c === backslash) this.escape(out)
      else if (c === close && --depth === 0) break
      else {
        if (c === open) depth++
        out.push(c)
      }
    }
    this.at++
    return Uint8Array.from(out)
  }

  private escape(out: number[]): void {
    const c = this.bytes[++this.at]
    if (c === undefined) throw new RanOut()
    if (c >= 48 && c <= 55) {
      let value = c - 48
      for (let k = 0; k < 2 && this.bytes[this.at + 1]! >= 48 && this.bytes[this.at + 1]! <= 55; k++) value = value * 8 + this.bytes[++this.at]! - 48
      out.push(value & 255)
    } else if (c === 13) {
      if (this.bytes[this.at + 1] === 10) this.at++
    } else if (c !== 10) out.push({ 110: 10, 114: 13, 116: 9, 98: 8, 102: 12 }[c] ?? c)
  }
}

function latin1(bytes: Uint8Array, from: number, to: number): string {
  return Buffer.from(bytes.buffer, bytes.byteOffset + from, to - from).toString('latin1')
}
