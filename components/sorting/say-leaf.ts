/** "leaf 12", or "left half of sheet 12" where one picture shows two pages. */
export function sayLeaf({ number, half }: Readonly<{ number: number; half: 0 | 1 | null }>): string {
  return half === null ? `leaf ${number}` : `${half === 0 ? 'left' : 'right'} half of sheet ${number}`
}

/** The same at the beginning of a line. */
export function sayLeafFirst(leaf: Readonly<{ number: number; half: 0 | 1 | null }>): string {
  const said = sayLeaf(leaf)
  return said.charAt(0).toUpperCase() + said.slice(1)
}
