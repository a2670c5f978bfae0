import { closeSync, fstatSync, openSync, readSync } from 'node:fs'

/** A file, or a part of one, of which pieces are read where they lie; nothing of it is kept. Close it after use. */
export class FileWindow {
  readonly size: number
  private readonly handle: number
  private readonly start: number
  constructor(path: string, part?: Readonly<{ at: number; size: number }>) {
    this.handle = openSync(path, 'r')
    const { size } = fstatSync(this.handle)
    this.start = part?.at ?? 0
    this.size = part ? Math.max(0, Math.min(part.size, size - part.at)) : size
  }

  /** Up to `length` bytes from `place`; fewer at the end of the file. A broken file may ask for a place between two bytes. */
  read(place: number, length: number): Buffer {
    const at = Math.floor(place)
    const wanted = Math.max(0, Math.min(Math.floor(length), this.size - at))
    const bytes = Buffer.allocUnsafeSlow(wanted)
    let got = 0
    while (got < wanted) {
      const more = readSync(this.handle, bytes, got, wanted - got, this.start + at + got)
      if (more === 0) return bytes.subarray(0, got)
      got += more
    }
    return bytes
  }

  /** Goes through the file from `from` in blocks that overlap by `overlap` bytes. `work` is given the block and where it begins, and stops by answering false. */
  forEachBlock(from: number, overlap: number, work: (block: Buffer, at: number) => boolean | void): void {
    for (let at = Math.max(0, from); at < this.size; at += blockSize) {
      if (work(this.read(at, blockSize + overlap), at) === false) return
    }
  }

  /** Where `text` next stands from `from` on, before `to`; -1 for nowhere. */
  find(text: string, from: number, to = this.size): number {
    let found = -1
    this.forEachBlock(from, text.length - 1, (block, at) => {
      const k = block.indexOf(text, 0, 'latin1')
      if (k >= 0 && at + k < to) found = at + k
      return k < 0 && at + blockSize < to
    })
    return found
  }

  close(): void {
    closeSync(this.handle)
  }
}

const blockSize = 1 << 20
