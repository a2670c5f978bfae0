import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { openReturnedPdf } from '@/lib/tasks/read-returned-script'

/** A returned script as a file: for its student while it stands handed back, and for the paper's owners. */
export async function GET(request: Request, { params }: { params: Promise<{ returnedScriptId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await openReturnedPdf(await requireActor(), (await params).returnedScriptId)
    const plain = name.normalize('NFKD').replace(/[^\w.,() -]/g, '')
    return new Response(new Uint8Array(bytes), {
      headers: {
        'content-type': 'application/pdf', 'content-length': String(bytes.length), 'cache-control': 'private, no-store',
        'content-disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(name)}`,
      },
    })
  })
}
