/** Says that the server answers: for the start command and for a school's watchdog. */
export function GET(): Response {
  return Response.json({ ok: true })
}
