/** Says on the summary which pages of a script are copies and why; null when none is. `of` counts the pages of the script. */
export function sayCopies(copies: readonly Readonly<{ page: number; cut: boolean }>[], of: number): string | null {
  if (copies.length === 0) return null
  const [cut, decoded] = [true, false].map((wanted) => copies.filter((copy) => copy.cut === wanted).map(({ page }) => page)) as [number[], number[]]
  const parts = [
    ...(cut.length > 0 ? [`${pages(cut)} cut out of a scan of two pages`] : []),
    ...(decoded.length > 0 ? [`${pages(decoded)} decoded from the scan without loss`] : []),
  ]
  return `${parts.join('; ')}${copies.length < of ? '; the others are unchanged' : ''}. The marking is drawn over them.`
}

function pages(numbers: readonly number[]): string {
  return numbers.length === 1 ? `Page ${numbers[0]} is` : `Pages ${numbers.slice(0, -1).join(', ')} and ${numbers.at(-1)} are`
}
