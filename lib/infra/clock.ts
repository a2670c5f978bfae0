/** Milliseconds since 1970. The one clock, so that rules get time as a value. */
export function now(): number {
  return Date.now()
}
