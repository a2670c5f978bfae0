import { sayMark, type HalfMarks } from '@/lib/core/marks'

/** A mark in a column: whole figures align right, the half hangs. `more` adds the + of marks still to come. */
export function MarkFigure({ mark, more = false }: { mark: HalfMarks; more?: boolean }) {
  const whole = Math.floor(mark / 2)
  const half = mark % 2 === 1
  return (
    <span className="m">
      <span aria-hidden>{half && whole === 0 ? '​' : whole}</span>
      {half && <i aria-hidden>½</i>}
      {more && <u aria-hidden>+</u>}
      <span className="vh">{sayMark(mark)}{more ? ' and more to come' : ''}</span>
    </span>
  )
}
