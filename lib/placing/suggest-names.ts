/** A script in the order it was scanned; `student` is its confirmed name. */
export type NamedScript = Readonly<{ id: string; student: string | null }>

/** A sheaf with fewer scripts than this share of the list says nothing about whose they are. */
const fewest = 0.5

/**
 * Whose script each unnamed one may be, when the pile lies in the order of the list: the next free student after the confirmed
 * neighbour before it. Where that cannot be (too few students up to the neighbour after it, or the neighbours lie the other way
 * round) nobody is suggested. Only ever a suggestion: a person looks at the name and says yes.
 * @param list the students that may have written, in the list's order; without those absent
 */
export function suggestNames(scripts: readonly NamedScript[], list: readonly string[]): Map<string, string | null> {
  const place = new Map(list.map((student, k) => [student, k]))
  const taken = new Set(scripts.flatMap(({ student }) => student ?? []))
  const suggested = new Map<string, string | null>()
  let last = -1
  for (let k = 0; k < scripts.length; ) {
    const { student } = scripts[k]!
    if (student !== null) {
      last = place.get(student) ?? last
      k++
      continue
    }
    const gap = unnamedFrom(scripts, k)
    const next = scripts[k + gap.length]?.student
    const end = next === undefined || next === null ? list.length : (place.get(next) ?? list.length)
    const free = list.slice(last + 1, Math.max(end, last + 1)).filter((one) => !taken.has(one))
    const fits = free.length >= gap.length && (taken.size > 0 || gap.length >= fewest * free.length)
    gap.forEach(({ id }, at) => suggested.set(id, fits ? free[at]! : null))
    k += gap.length
  }
  return suggested
}

function unnamedFrom(scripts: readonly NamedScript[], from: number): readonly NamedScript[] {
  const end = scripts.findIndex(({ student }, k) => k >= from && student !== null)
  return scripts.slice(from, end === -1 ? undefined : end)
}
