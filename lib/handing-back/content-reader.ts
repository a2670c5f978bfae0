/** An operand as far as it matters here: numbers and names; strings, arrays and dictionaries are passed over (null). */
export type Operand = number | Readonly<{ name: string }> | null
/** One operator of a content stream with what stood before it. An inline image comes as BI with the names of its dictionary. */
export type Operation = Readonly<{ operator: string; operands: readonly Operand[] }>

const white = new Set([0, 9, 10, 12, 13, 32])
const delimiters = new Set([...'()<>[]{}/%'].map((letter) => letter.charCodeAt(0)))
const code = (letter: string): number => letter.charCodeAt(0)

/** Reads the operators of a decoded content stream (ISO 32000-1, 7.8.2). Never throws: what it cannot read it steps over. */
export function* readContent(bytes: Uint8Array): Generator<Operation> {
  let at = 0
  let operands: Operand[] = []
  while (at < bytes.length) {
    const byte = bytes[at]!
    if (white.has(byte)) at += 1
    else if (byte === code('%')) at = lineEnd(bytes, at)
    else if (byte === code('(')) {
      at = stringEnd(bytes, at)
      operands.push(null)
    } else if (byte === code('<') && bytes[at + 1] !== code('<')) {
      at = bytes.indexOf(code('>'), at) + 1 || bytes.length
      operands.push(null)
    } else if (byte === code('/')) {
      const end = wordEnd(bytes, at + 1)
      operands.push({ name: latin(bytes, at + 1, end) })
      at = end
    } else if (delimiters.has(byte)) at += 1
    else {
      const end = wordEnd(bytes, at)
      const word = latin(bytes, at, end)
      at = end
      if (/^[+-]?[\d.]/.test(word)) operands.push(Number(word) || 0)
      else if (word === 'ID') {
        at = inlineImageEnd(bytes, at)
        yield { operator: 'BI', operands }
        operands = []
      } else if (word !== 'BI') {
        yield { operator: word, operands }
        operands = []
      }
    }
  }
}

function latin(bytes: Uint8Array, from: number, to: number): string {
  return Buffer.from(bytes.subarray(from, to)).toString('latin1')
}

function wordEnd(bytes: Uint8Array, from: number): number {
  let at = from
  while (at < bytes.length && !white.has(bytes[at]!) && !delimiters.has(bytes[at]!)) at += 1
  return at
}

function lineEnd(bytes: Uint8Array, from: number): number {
  let at = from
  while (at < bytes.length && bytes[at] !== 10 && bytes[at] !== 13) at += 1
  return at
}

/** Past the closing bracket of a string that may hold brackets and escapes. */
function stringEnd(bytes: Uint8Array, from: number): number {
  let depth = 0
  for (let at = from; at < bytes.length; at++) {
    if (bytes[at] === code('\\')) at += 1
    else if (bytes[at] === code('(')) depth += 1
    else if (bytes[at] === code(')') && --depth === 0) return at + 1
  }
  return bytes.length
}

/** Past an inline image's EI: the first that stands alone, white space on both sides. */
function inlineImageEnd(bytes: Uint8Array, from: number): number {
  for (let at = from + 1; at + 1 < bytes.length; at++) {
    const ends = bytes[at] === code('E') && bytes[at + 1] === code('I') && white.has(bytes[at - 1]!)
    if (ends && (at + 2 >= bytes.length || white.has(bytes[at + 2]!))) return at + 2
  }
  return bytes.length
}
