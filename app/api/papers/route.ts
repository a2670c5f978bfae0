import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { readJsonFile } from '@/app/_door/read-json-file'
import { AppError } from '@/lib/core/errors'
import { respond } from '@/lib/infra/respond'
import { createPaper } from '@/lib/tasks/create-paper'

const Form = z.object({
  id: z.uuid(),
  title: z.string().trim().max(200),
  step: z.union([z.literal(1), z.literal(2)]),
  classSets: z.array(z.object({ classId: z.string().min(1), satOn: z.iso.date() })).max(40),
})
const limit = 64 * 1024 * 1024

/** Makes a paper: multipart with `form` (JSON), and where there are any `blank` (PDF) and `paper` (paper.json). */
export async function POST(request: Request): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    if (Number(request.headers.get('content-length') ?? 0) > limit) throw new AppError('file_too_large', { limitMb: 64 })
    const data = await request.formData()
    const form = Form.parse(JSON.parse(String(data.get('form'))))
    const blank = data.get('blank')
    const paper = data.get('paper')
    return createPaper(actor, {
      ...form,
      blank: blank instanceof File ? { bytes: new Uint8Array(await blank.arrayBuffer()), name: blank.name } : null,
      paperFile: paper instanceof File ? readJsonFile(await paper.text()) : undefined,
    })
  })
}
