const dark = 165

/** The dark pieces of one line: where each begins, where it has ended, and its darkest. Filled again for every line. */
export type DarkRuns = { count: number; readonly from: Uint16Array; readonly to: Uint16Array; readonly darkest: Uint8Array }

export function makeRuns(width: number): DarkRuns {
  const most = (width >> 1) + 1
  return { count: 0, from: new Uint16Array(most), to: new Uint16Array(most), darkest: new Uint8Array(most) }
}

/** Finds the dark pieces of a line of a levelled page. */
export function findRuns(line: Uint8Array, runs: DarkRuns): void {
  let count = 0
  for (let x = 0; x < line.length; x++) {
    if (line[x]! >= dark) continue
    runs.from[count] = x
    let darkest = 255
    for (; x < line.length && line[x]! < dark; x++) if (line[x]! < darkest) darkest = line[x]!
    runs.to[count] = x
    runs.darkest[count++] = darkest
  }
  runs.count = count
}
