import { fileKind, kindBytes } from '@/lib/core/file-kind'
import { mostPictures, packHead } from '@/lib/core/picture-pack'

/** What was chosen as one file to send: a file by itself, or several pictures together in the order of their names; null for a mixture or too many. */
export async function oneFile(files: readonly File[]): Promise<File | null> {
  if (files.length === 1) return files[0]!
  if (files.length > mostPictures) return null
  const kinds = await Promise.all(files.map(async (file) => fileKind(new Uint8Array(await file.slice(0, kindBytes).arrayBuffer()))))
  if (!kinds.every((kind) => kind === 'jpeg' || kind === 'png' || kind === 'tiff')) return null
  const inOrder = [...files].sort((a, b) => a.name.localeCompare(b.name, undefined, { numeric: true }))
  const newest = Math.max(...inOrder.map((file) => file.lastModified))
  return new File([packHead(inOrder.map((file) => file.size)), ...inOrder], `${inOrder[0]!.name} and ${inOrder.length - 1} more`, { lastModified: newest })
}
