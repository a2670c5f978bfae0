/** A small generator of numbers from a seed: the same seed gives the same numbers (mulberry32). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = state
    t = Math.imul(t ^ (t >>> 15), t | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32
  }
}

const words = ['obj', 'endobj', 'stream', 'endstream', 'xref', 'trailer', 'startxref', '/Length', '/Kids', '/Count', '/Type', '/Filter', '/Width', '/Height', '/Resources', '/Contents', '/Parent', '/Root', '/Prev', '<<', '>>', '[', ']', '(', ' R']

/** A file with one to four faults: bits turned, numbers changed, words swapped or lost, pieces cut out, doubled, moved or filled, the end lost. */
export function mutate(bytes: Buffer, random: () => number): Buffer {
  let out = Buffer.from(bytes)
  for (let k = 1 + Math.floor(random() * 4); k > 0; k--) out = Buffer.from(faults[Math.floor(random() * faults.length)]!(out, random))
  return out
}

type Fault = (bytes: Buffer, random: () => number) => Buffer
const upTo = (most: number, random: () => number) => Math.floor(random() * Math.max(1, most))

const faults: readonly Fault[] = [
  function turnBits(bytes, random) {
    for (let k = 1 + upTo(20, random); k > 0; k--) bytes[upTo(bytes.length, random)]! ^= 1 << upTo(8, random)
    return bytes
  },
  function cutEnd(bytes, random) {
    return bytes.subarray(0, Math.max(20, upTo(bytes.length, random)))
  },
  function changeNumber(bytes, random) {
    const found = [...bytes.toString('latin1').matchAll(/\d+/g)]
    const one = found[upTo(found.length, random)]
    if (!one) return bytes
    const values = ['0', '-1', '1', '2', '3', '65536', '2147483647', '99999999999', '0.0001', String(upTo(1000, random))]
    return spliced(bytes, one.index, one[0].length, values[upTo(values.length, random)]!)
  },
  function changeWord(bytes, random) {
    const word = words[upTo(words.length, random)]!
    const at: number[] = []
    for (let k = bytes.indexOf(word); k >= 0; k = bytes.indexOf(word, k + 1)) at.push(k)
    return at.length === 0 ? bytes : spliced(bytes, at[upTo(at.length, random)]!, word.length, random() < 0.5 ? '' : words[upTo(words.length, random)]!)
  },
  function doublePiece(bytes, random) {
    const from = upTo(bytes.length, random)
    const piece = bytes.subarray(from, from + upTo(3000, random))
    const to = upTo(bytes.length, random)
    return Buffer.concat([bytes.subarray(0, to), piece, bytes.subarray(to)])
  },
  function dropPiece(bytes, random) {
    const from = upTo(bytes.length, random)
    return Buffer.concat([bytes.subarray(0, from), bytes.subarray(from + upTo(500, random))])
  },
  function fillPiece(bytes, random) {
    const from = upTo(bytes.length, random)
    bytes.fill(random() < 0.5 ? 0 : 32, from, Math.min(bytes.length, from + upTo(400, random)))
    return bytes
  },
  function doubleObject(bytes, random) {
    const found = [...bytes.toString('latin1').matchAll(/\d+ \d+ obj[\s\S]*?endobj/g)]
    const one = found[upTo(found.length, random)]
    const other = found[upTo(found.length, random)]
    if (!one || !other) return bytes
    // one object under another's number
    const copy = one[0].replace(/^\d+/, /^\d+/.exec(other[0])![0])
    return Buffer.concat([bytes.subarray(0, other.index), Buffer.from(`${copy}\n`, 'latin1'), bytes.subarray(other.index)])
  },
]

function spliced(bytes: Buffer, at: number, length: number, text: string): Buffer {
  return Buffer.concat([bytes.subarray(0, at), Buffer.from(text, 'latin1'), bytes.subarray(at + length)])
}
