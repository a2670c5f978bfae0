import { Sheet, ink, sheetSize, type SheetFile, type Style } from './sheet'
import type { Structure } from './structure'
import type { Typesetter } from '@/lib/typesetting/typesetter'

/** The frame of the summary in points: text runs from left to right, and down to bottom. */
export const frame = { left: 48, right: sheetSize.width - 48, top: 42, bottom: sheetSize.height - 62 }
export const plain: Style = { face: 'sans', size: 10.125, colour: ink.text }
export const soft: Style = { ...plain, colour: ink.soft }
export const small: Style = { face: 'sans', size: 9.375, colour: ink.soft }
export const leading = 15

/** Sheets of the summary as they are needed, and how far down the one in work is filled. */
export class SummarySheets {
  readonly sheets: Sheet[] = []
  y = frame.top

  constructor(private readonly file: SheetFile) {
    this.turn()
  }

  get type(): Typesetter {
    return this.file.type
  }

  get structure(): Structure {
    return this.file.structure
  }

  get sheet(): Sheet {
    return this.sheets.at(-1)!
  }

  /** Starts the next sheet. */
  turn(): void {
    this.sheets.push(new Sheet(this.file))
    this.y = frame.top
  }
}
