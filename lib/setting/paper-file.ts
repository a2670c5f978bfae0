import { z } from 'zod'

/** The shape of a paper.json. Marks are written as files for machines write them (1.5); places are paper points. Unknown keys are ignored. */

/** Raised only when an older reader could no longer understand the file. */
export const paperFileFormat = 1

const region = { x: z.number(), y: z.number(), w: z.number().positive(), h: z.number().positive() }
const Region = z.object(region)
const page = z.int().min(1)
/** A whole number of halves. */
const marks = z.number().max(200).refine((value) => Number.isInteger(value * 2), 'is not a whole number of half marks')

const FilePoint = z.object({
  label: z.string().trim().min(1).max(300),
  marks: marks.refine((value) => value > 0, 'is not more than nought'),
  kind: z.enum(['M', 'A', 'B']).nullish(),
  note: z.string().max(2000).optional(),
  /** The label, or the number counted from 1, of another mark point of this question. */
  depends_on: z.union([z.string(), z.int().min(1)]).nullish(),
})

const FileQuestion = z.object({
  label: z.string().trim().min(1).max(20),
  page,
  region: Region,
  more_spaces: z.array(z.object({ page, region: Region })).max(19).optional(),
  max_marks: marks.refine((value) => value > 0, 'is not more than nought'),
  mark_points: z.array(FilePoint).max(40).default([]),
  answer: z.string().max(1000).default(''),
  text: z.string().max(4000).optional(),
  model_solution: z.string().max(8000).optional(),
  scheme_note: z.string().max(4000).optional(),
  tolerance: marks.nullish(),
})

const GradeScale = z.object({
  odd_half: z.enum(['kept', 'up', 'down']).default('kept'),
  boundaries: z.array(z.object({ grade: z.string().trim().min(1).max(20), lowest: marks.refine((value) => value >= 0, 'is under nought') })).max(40),
})

export const PaperFile = z.object({
  format: z.int().min(1).max(paperFileFormat, 'is newer than this program can read').optional(),
  title: z.string().trim().min(1).max(200),
  page_size: z.string().optional(),
  page_width: z.number().positive(),
  page_height: z.number().positive(),
  pages: z.int().min(1).max(40),
  /** Only for pages of another size than page_width and page_height. */
  other_page_sizes: z.array(z.object({ page, width: z.number().positive(), height: z.number().positive() })).optional(),
  name_region: z.object({ page, ...region }).nullish(),
  candidate_number_boxes: z.array(z.object({ page: page.optional(), ...region })).max(39).default([]),
  marking_step: z.union([z.literal(0.5), z.literal(1)]).optional(),
  tolerance: marks.optional(),
  sample_size: z.int().min(1).nullish(),
  names_hidden: z.boolean().optional(),
  solutions_released: z.boolean().optional(),
  grade_scale: GradeScale.optional(),
  questions: z.array(FileQuestion).max(120),
})
export type PaperFile = z.output<typeof PaperFile>
export type FileQuestion = z.output<typeof FileQuestion>
export type FilePoint = z.output<typeof FilePoint>
