// JBIG2 as copiers write it (ITU-T T.88): one generic region over the whole page, in arithmetic or in MMR coding.

/** State, next state after the likelier and after the rarer symbol, and whether the likelier one changes (T.88 table E.1). */
const states = `5601 1 1 1,3401 2 6 0,1801 3 9 0,0ac1 4 12 0,0521 5 29 0,0221 38 33 0,5601 7 6 1,5401 8 14 0,4801 9 14 0,3801 10 14 0,3001 11 17 0,2401 12 18 0,1c01 13 20 0,1601 29 21 0,5601 15 14 1,5401 16 14 0,5101 17 15 0,4801 18 16 0,3801 19 17 0,3401 20 18 0,3001 21 19 0,2801 22 19 0,2401 23 20 0,2201 24 21 0,1c01 25 22 0,1801 26 23 0,1601 27 24 0,1401 28 25 0,1201 29 26 0,1101 30 27 0,0ac1 31 28 0,09c1 32 29 0,08a1 33 30 0,0521 34 31 0,0441 35 32 0,02a1 36 33 0,0221 37 34 0,0141 38 35 0,0111 39 36 0,0085 40 37 0,0049 41 38 0,0025 42 39 0,0015 43 40 0,0009 44 41 0,0005 45 42 0,0001 45 43 0,5601 46 46 0`
  .split(',').map((row) => row.split(' ')).map(([qe, mps, lps, change]) => ({ qe: Number.parseInt(qe!, 16), mps: Number(mps), lps: Number(lps), change: change === '1' }))

/** A page of one bit a pixel, 1 is black. */
export type Bits = Readonly<{ width: number; height: number; black: (x: number, y: number) => boolean }>

/** The page's segments, coded arithmetically with template 0. */
export function jbig2(page: Bits): Buffer {
  const nominal = Buffer.from([3, -1, -3, -1, 2, -2, -2, -2].map((v) => v & 255))
  return segments(page, 0, Buffer.concat([nominal, arithmetic(page)]))
}

/** The same around a G4 stream of the page. */
export function jbig2Mmr(width: number, height: number, g4: Uint8Array): Buffer {
  return segments({ width, height }, 1, Buffer.from(g4))
}

function segments({ width, height }: { width: number; height: number }, flags: number, data: Buffer): Buffer {
  const size = Buffer.alloc(8)
  size.writeUInt32BE(width, 0)
  size.writeUInt32BE(height, 4)
  const page = Buffer.concat([size, Buffer.alloc(11)])
  const region = Buffer.concat([size, Buffer.alloc(9), Buffer.from([flags]), data])
  return Buffer.concat([segment(0, 48, page), segment(1, 38, region)])
}

function segment(number: number, type: number, data: Buffer): Buffer {
  const head = Buffer.alloc(11)
  head.writeUInt32BE(number, 0)
  head[4] = type
  head[6] = 1
  head.writeUInt32BE(data.length, 7)
  return Buffer.concat([head, data])
}

function arithmetic({ width, height, black }: Bits): Buffer {
  const at = (x: number, y: number) => (x >= 0 && x < width && y >= 0 && black(x, y) ? 1 : 0)
  const coder = new ArithmeticCoder()
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++) {
      let context = 0
      for (let dx = -2; dx <= 2; dx++) context = context * 2 + at(x + dx, y - 2)
      for (let dx = -3; dx <= 3; dx++) context = context * 2 + at(x + dx, y - 1)
      for (let dx = -4; dx < 0; dx++) context = context * 2 + at(x + dx, y)
      coder.put(context, at(x, y))
    }
  return coder.end()
}

/** T.88 annex E.2. */
class ArithmeticCoder {
  private readonly state = new Uint8Array(65536)
  private readonly likely = new Uint8Array(65536)
  private readonly out: number[] = [0]
  private a = 0x8000
  private c = 0
  private ct = 12

  put(context: number, bit: number): void {
    const { qe, mps, lps, change } = states[this.state[context]!]!
    this.a -= qe
    if (bit === this.likely[context]) {
      if (this.a & 0x8000) {
        this.c += qe
        return
      }
      if (this.a < qe) this.a = qe
      else this.c += qe
      this.state[context] = mps
    } else {
      if (this.a < qe) this.c += qe
      else this.a = qe
      if (change) this.likely[context] = 1 - this.likely[context]!
      this.state[context] = lps
    }
    do {
      this.a <<= 1
      this.c *= 2
      if (--this.ct === 0) this.byte()
    } while (!(this.a & 0x8000))
  }

  private byte(): void {
    const last = this.out.length - 1
    if (this.out[last] !== 0xff && this.c >= 0x8000000) {
      this.out[last]!++
      if (this.out[last] === 0xff) this.c %= 0x8000000
    }
    const stuffed = this.out[last] === 0xff
    const unit = stuffed ? 0x100000 : 0x80000
    this.out.push(Math.floor(this.c / unit) & 255)
    this.c %= unit
    this.ct = stuffed ? 7 : 8
  }

  end(): Buffer {
    const upper = this.c + this.a
    this.c = Math.floor(this.c / 0x10000) * 0x10000 + 0xffff
    if (this.c >= upper) this.c -= 0x8000
    for (let k = 0; k < 2; k++) {
      this.c *= 2 ** this.ct
      this.byte()
    }
    return Buffer.from([...this.out.slice(1), 0xff, 0xac])
  }
}
