import { z } from 'zod'
import type { PaperRect } from '@/lib/core/paper-space'

const Box = z.object({ page: z.int().min(1).optional(), x: z.number(), y: z.number(), w: z.number().positive(), h: z.number().positive() })
const File = z.object({ name_region: z.object({ page: z.int().min(1).optional() }).nullish(), candidate_number_boxes: z.array(Box).nullish() })

/** The boxes of the candidate number that a paper file names, by page (from 1), in points. A file that names none, or names them wrongly, has none. */
export function numberBoxesOf(file: unknown): Map<number, PaperRect[]> {
  const parsed = File.safeParse(file)
  const boxes = new Map<number, PaperRect[]>()
  if (!parsed.success) return boxes
  const usual = parsed.data.name_region?.page ?? 1
  for (const { page = usual, x, y, w, h } of parsed.data.candidate_number_boxes ?? []) boxes.set(page, [...(boxes.get(page) ?? []), { x, y, w, h }])
  return boxes
}
