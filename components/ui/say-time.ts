const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' })
const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' })

/** A moment as people write it, in the school's time: 12 Mar 2027, 09:05. */
export function sayTime(at: number): string {
  return `${day.format(at)}, ${clock.format(at)}`
}
