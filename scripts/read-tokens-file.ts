import Papa from 'papaparse'
import { z } from 'zod'
import { isToken, type PrintedCodes, type PrintedPage } from '@/lib/core/printed-code'

const Row = z.object({
  token: z.string().refine(isToken), script: z.string().min(1), candidate_number: z.string().default(''), paper_page: z.coerce.number<string>().int().min(1),
  x: z.coerce.number<string>(), y: z.coerce.number<string>(), side: z.coerce.number<string>().positive(),
})

/** The codes of a print pack and the candidate number of each of its scripts (spare ones have none), from a tokens.csv. Null when it is none. */
export function readTokensFile(text: string): { codes: PrintedCodes; candidates: ReadonlyMap<string, string> } | null {
  const parsed = z.array(Row).min(1).safeParse(Papa.parse(text, { header: true, skipEmptyLines: true }).data)
  if (!parsed.success) return null
  const codes = new Map<string, PrintedPage>()
  const candidates = new Map<string, string>()
  for (const { token, script, candidate_number, paper_page, x, y, side } of parsed.data) {
    codes.set(token, { script, paperPage: paper_page, rect: { x, y, w: side, h: side } })
    if (candidate_number) candidates.set(script, candidate_number)
  }
  return { codes, candidates }
}
