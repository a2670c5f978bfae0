/** A file (a PDF unless said) sent as a download, under a name in any letters; no cache may keep it. */
export function downloadResponse(body: Uint8Array | ReadableStream<Uint8Array>, name: string, type = 'application/pdf'): Response {
  const plain = name.normalize('NFKD').replace(/[^\w.,() -]/g, '')
  const headers: Record<string, string> = {
    'content-type': type, 'cache-control': 'private, no-store',
    'content-disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(name).replaceAll("'", '%27')}`,
  }
  if (body instanceof Uint8Array) headers['content-length'] = String(body.length)
  return new Response(body instanceof Uint8Array ? new Uint8Array(body) : body, { headers })
}
