/** One piece of a content stream: an operand (numbers and names matter here, the rest is `other`) or an operator. */
export type ContentToken = Readonly<{ kind: 'number'; value: number } | { kind: 'name'; value: string } | { kind: 'other' } | { kind: 'operator'; value: string }>

const space = new Set([0, 9, 10, 12, 13, 32])
const delimiter = new Set([...'()<>[]{}/%'].map((c) => c.charCodeAt(0)))

/** Cuts a decoded content stream into tokens. Strings and inline image data are skipped over, never looked into. */
export function* contentTokens(bytes: Uint8Array): Generator<ContentToken> {
  let at = 0
  const word = (): string => {
    const from = at
    while (at < bytes.length && !space.has(bytes[at]!) && !delimiter.has(bytes[at]!)) at++
    return String.fromCharCode(...bytes.subarray(from, Math.min(at, from + 200)))
  }
  while (at < bytes.length) {
    const c = bytes[at]!
    if (space.has(c)) at++
    else if (c === 0x25) while (at < bytes.length && bytes[at] !== 10 && bytes[at] !== 13) at++
    else if (c === 0x2f) {
      at++
      const text = word()
      yield { kind: 'name', value: text.includes('#') ? text.replace(/#([0-9a-fA-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16))) : text }
    } else if (c === 0x28) {
      at = afterString(bytes, at)
      yield { kind: 'other' }
    } else if (delimiter.has(c)) at++
    else {
      const text = word()
      const value = Number(text)
      if (text !== '' && !Number.isNaN(value)) yield { kind: 'number', value }
      else yield { kind: 'operator', value: text }
      if (text === 'ID') at = afterInlineImage(bytes, at)
    }
  }
}

function afterString(bytes: Uint8Array, start: number): number {
  let depth = 0
  for (let at = start; at < bytes.length; at++) {
    if (bytes[at] === 0x5c) at++
    else if (bytes[at] === 0x28) depth++
    else if (bytes[at] === 0x29 && --depth === 0) return at + 1
  }
  return bytes.length
}

function afterInlineImage(bytes: Uint8Array, start: number): number {
  for (let at = start; at + 2 < bytes.length; at++)
    if (space.has(bytes[at]!) && bytes[at + 1] === 0x45 && bytes[at + 2] === 0x49 && (at + 3 >= bytes.length || space.has(bytes[at + 3]!))) return at + 3
  return bytes.length
}
