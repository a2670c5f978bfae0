import { z } from 'zod'

const Target = z.union([z.object({ scriptId: z.uuid() }), z.object({ classSetId: z.uuid(), studentId: z.uuid() })])
const Corner = z.object({ x: z.number().min(-50_000).max(50_000), y: z.number().min(-50_000).max(50_000) })

/** What a person can do at the sorting table, as the browser asks for it. Corners are pixels of the stored image. */
export const SortingAct = z.discriminatedUnion('act', [
  z.object({ act: z.literal('place'), leafId: z.uuid(), target: Target, paperPage: z.int().min(1).max(40), instead: z.boolean().default(false), corners: z.array(Corner).length(4).optional() }),
  z.object({ act: z.literal('extra'), leafId: z.uuid(), target: Target }),
  z.object({ act: z.literal('lay'), leafId: z.uuid(), to: z.enum(['loose', 'set_aside']) }),
  z.object({ act: z.literal('turn'), leafId: z.uuid(), turn: z.union([z.literal(0), z.literal(90), z.literal(180), z.literal(270)]) }),
  z.object({ act: z.literal('name'), scriptId: z.uuid(), classSetId: z.uuid(), studentId: z.uuid() }),
  z.object({ act: z.literal('certain_names'), names: z.array(z.object({ scriptId: z.uuid(), classSetId: z.uuid(), studentId: z.uuid() })).min(1).max(1000) }),
  z.object({ act: z.literal('unname'), scriptId: z.uuid() }),
  z.object({ act: z.literal('attendance'), classSetId: z.uuid(), studentId: z.uuid(), attendance: z.enum(['expected', 'absent', 'excused']) }),
  z.object({ act: z.literal('undo') }),
])
export type SortingAct = z.input<typeof SortingAct>
export type GivenSortingAct = z.output<typeof SortingAct>
