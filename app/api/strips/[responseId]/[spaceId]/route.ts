import { pictureAsked, pictureResponse } from '@/app/_door/picture-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readStripPicture } from '@/lib/tasks/read-strip-picture'

type Params = { params: Promise<{ responseId: string; spaceId: string }> }

export async function GET(request: Request, { params }: Params): Promise<Response> {
  return respond(request, async () => {
    const asked = pictureAsked(request)
    return pictureResponse(request, await readStripPicture(await requireActor(), { ...(await params), ...asked }), asked)
  })
}
