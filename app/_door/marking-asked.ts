import { z } from 'zod'
import { rounds } from '@/lib/core/stamp'

/** Which of one's markings is meant. */
export const MarkingAsked = z.object({ responseId: z.string().min(1).max(64), round: z.enum(rounds) })
