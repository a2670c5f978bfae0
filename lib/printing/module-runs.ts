import { encode } from 'uqr'
import { AppError } from '@/lib/core/errors'
import { codeModules } from '@/lib/core/printed-code'

/** A row of dark modules: column and row of the first, from the symbol's top left, and how many. */
export type ModuleRun = Readonly<{ column: number; row: number; length: number }>

/** The dark modules of a token's QR symbol, version 1 with error correction Q, as runs along its rows. Throws bad_input for a text that needs a larger symbol. */
export function moduleRuns(token: string): ModuleRun[] {
  const { data, size } = encode(token, { ecc: 'Q', boostEcc: false, border: 0 })
  if (size !== codeModules) throw new AppError('bad_input')
  return data.flatMap((cells, row) => runsOf(cells).map(({ from, to }) => ({ column: from, row, length: to - from })))
}

function runsOf(cells: readonly boolean[]): { from: number; to: number }[] {
  const runs: { from: number; to: number }[] = []
  cells.forEach((dark, k) => {
    if (!dark) return
    if (k > 0 && cells[k - 1]) runs.at(-1)!.to = k + 1
    else runs.push({ from: k, to: k + 1 })
  })
  return runs
}
