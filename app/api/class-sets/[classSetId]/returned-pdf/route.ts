import { Readable } from 'node:stream'
import { downloadResponse } from '@/app/_door/download-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { openClassPdf } from '@/lib/tasks/open-class-bundle'

/** All returned scripts of a class set in one file for printing on both sides, sent as it is made. */
export async function GET(request: Request, { params }: { params: Promise<{ classSetId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { name, stream } = await openClassPdf(await requireActor(), (await params).classSetId)
    return downloadResponse(Readable.toWeb(stream) as ReadableStream<Uint8Array>, name, 'application/pdf')
  })
}
