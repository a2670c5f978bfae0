const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']

/** 2026-03-12 as 12 March; with another year than `year`, as 12 March 2025. */
export function sayDate(date: string, year?: number): string {
  const [y, m, d] = date.split('-').map(Number) as [number, number, number]
  return `${d} ${months[m - 1]}${year === undefined || year === y ? '' : ` ${y}`}`
}
