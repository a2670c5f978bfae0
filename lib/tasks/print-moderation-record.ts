import type { Actor } from '@/lib/core/actor'
import { buildRecord } from '@/lib/handing-back/build-record'
import { readModerationRecord } from './read-moderation-record'

/** The record of one sample as a PDF with a name to save it by, for an owner. Throws not_found or not_allowed. */
export async function printModerationRecord(actor: Actor, sampleId: string): Promise<{ bytes: Uint8Array; name: string }> {
  const { record, at } = await readModerationRecord(actor, sampleId)
  return { bytes: await buildRecord(record, new Date(at)), name: `${record.title.replace(/[\\/:*?"<>|]+/g, ' ').replace(/\s+/g, ' ').trim()}.pdf` }
}
