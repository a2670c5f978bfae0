import { downloadResponse } from '@/app/_door/download-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { printSlips, SlipsForm } from '@/lib/tasks/print-slips'

/** Sign-in slips that were just given out, as a PDF. */
export async function POST(request: Request, { params }: { params: Promise<{ classId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await printSlips(await requireActor(), (await params).classId, SlipsForm.parse(await request.json()))
    return downloadResponse(bytes, name)
  })
}
