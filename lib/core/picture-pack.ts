/** Several pictures on their way as one file, so that one upload brings one sheaf: a first line, their sizes, then their bytes one after the other. */
const mark = 'pictures of a sheaf, one after the other\n'
export const mostPictures = 500
/** As many bytes as a head may have. */
export const packHeadBytes = 16_384

/** The head of a pack of pictures of these sizes in bytes. */
export function packHead(sizes: readonly number[]): string {
  return `${mark}${sizes.join(' ')}\n`
}

/** Where each picture of a pack lies in it; null when the file is no pack, or its head cannot be read. */
export function packedPlaces(head: Uint8Array): { at: number; size: number }[] | null {
  const text = String.fromCharCode(...head.subarray(0, packHeadBytes))
  if (!isPack(head)) return null
  const end = text.indexOf('\n', mark.length)
  const sizes = end < 0 ? [] : text.slice(mark.length, end).split(' ').map(Number)
  if (sizes.length === 0 || sizes.length > mostPictures || sizes.some((size) => !Number.isSafeInteger(size) || size < 0)) return null
  let at = end + 1
  return sizes.map((size) => ({ at: (at += size) - size, size }))
}

/** Whether a file that begins so is a pack of pictures. */
export function isPack(head: Uint8Array): boolean {
  return String.fromCharCode(...head.subarray(0, mark.length)) === mark
}
