/** The label that would come after one: 1a gives 1b, 2 gives 3. Skips those that are taken; nothing before gives 1. */
export function nextLabel(before: string | null, taken: readonly string[]): string {
  const used = new Set(taken.map((label) => label.trim().toLowerCase()))
  const free = (label: string) => !used.has(label.toLowerCase())
  const part = /^(.*\d)([a-y])$/i.exec(before ?? '')
  if (part) {
    const letter = `${part[1]}${String.fromCharCode(part[2]!.charCodeAt(0) + 1)}`
    if (free(letter)) return letter
  }
  const [, head, number] = /^(.*?)(\d+)[a-z]?$/i.exec(before ?? '') ?? [null, '', '0']
  for (let n = Number(number) + 1; ; n++) if (free(`${head}${n}`)) return `${head}${n}`
}
