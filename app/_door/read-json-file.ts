import { AppError } from '@/lib/core/errors'

/** The value of a JSON file a person chose, with or without a byte order mark; throws paper_invalid when it is no JSON. */
export function readJsonFile(text: string): unknown {
  try {
    return JSON.parse(text.replace(/^\uFEFF/, '')) as unknown
  } catch {
    throw new AppError('paper_invalid', { lines: [{ path: 'the file', says: 'is not JSON. Choose the paper.json that was saved from a paper.' }] })
  }
}
