/** A time in milliseconds as its day: "1 December 2026". */
export function sayInstant(at: number): string {
  return new Date(at).toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })
}
