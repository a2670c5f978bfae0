import { z } from 'zod'

/** How a picture of a script is asked for: `dpi`, and `v`, the name of the cut that the address was made for. */
export function pictureAsked(request: Request): { dpi: number; key: string | null } {
  const query = new URL(request.url).searchParams
  return { dpi: z.coerce.number().min(36).max(400).default(120).parse(query.get('dpi') ?? undefined), key: query.get('v') }
}

/** Sends a picture. Its address changes with the cut, so a browser (and no shared cache) may keep it for this person; an old address is asked again. */
export function pictureResponse(request: Request, picture: Readonly<{ bytes: Buffer; type: string; key: string }>, asked: Readonly<{ dpi: number; key: string | null }>): Response {
  const etag = `"${picture.key}-${asked.dpi}"`
  const lasting = asked.key === picture.key ? 'private, max-age=31536000, immutable' : 'private, no-cache'
  const headers = { etag, 'cache-control': lasting, 'content-type': picture.type, vary: 'Cookie', 'x-content-type-options': 'nosniff' }
  if (request.headers.get('if-none-match') === etag) return new Response(null, { status: 304, headers })
  return new Response(new Uint8Array(picture.bytes), { headers })
}
